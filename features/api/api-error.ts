import { problem, type Problem } from "@shared/contracts/contract";

/** The server's refusal, as the problem document it sent. */
export class ApiError extends Error {
  constructor(readonly problem: Problem) {
    super(problem.detail || problem.title);
    this.name = "ApiError";
  }

  get status(): number {
    return this.problem.status;
  }

  get code(): string {
    return this.problem.code;
  }

  /** The server's word on one field, by JSON pointer such as `/body/name`. */
  fieldError(pointer: string): string | null {
    return this.problem.errors?.find((error) => error.pointer === pointer)?.message ?? null;
  }
}

/** No answer came at all: the server is down or there is no network. */
export class NoAnswer extends Error {
  constructor(cause: unknown) {
    super("no answer from the server", { cause });
    this.name = "NoAnswer";
  }
}

/** Reads a problem document; an answer that is none (a proxy's page) becomes one that says so. */
export function problemFrom(status: number, text: string): Problem {
  try {
    return problem.parse(JSON.parse(text));
  } catch {
    return {
      type: "about:blank",
      title: "Unreadable answer",
      status,
      code: "unreadableAnswer",
      detail: `The server answered with status ${status} and no explanation.`,
      remedy: "Try again. If it stays, tell your administrator.",
    };
  }
}
