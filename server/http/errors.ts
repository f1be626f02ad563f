import type { Problem } from "@shared/contracts/contract";

export interface FieldError {
  /** JSON pointer into the input: /body/zone, /query/from, /params/siteId. */
  readonly pointer: string;
  readonly code: string;
  readonly message: string;
  /** The bound that was crossed, of the contract's own checks. */
  readonly bound?: Bound | undefined;
}

export type Bound = NonNullable<NonNullable<Problem["errors"]>[number]["bound"]>;

interface ProblemParts {
  status: number;
  code: string;
  title: string;
  detail: string;
  remedy: string;
  errors?: readonly FieldError[];
  headers?: Readonly<Record<string, string>>;
}

/**
 * A refusal the caller is told about, as an RFC 9457 problem document. Throw one anywhere below a
 * handler; anything else thrown becomes a 500 that tells nothing of the inside.
 */
export class HttpProblem extends Error {
  readonly status: number;
  readonly code: string;
  readonly title: string;
  readonly remedy: string;
  readonly errors: readonly FieldError[] | undefined;
  readonly headers: Readonly<Record<string, string>>;

  constructor(parts: ProblemParts) {
    super(parts.detail);
    this.name = new.target.name;
    this.status = parts.status;
    this.code = parts.code;
    this.title = parts.title;
    this.remedy = parts.remedy;
    this.errors = parts.errors;
    this.headers = parts.headers ?? {};
  }

  toDocument(): Problem {
    return {
      type: `urn:loopwright:problem:${this.code}`,
      title: this.title,
      status: this.status,
      code: this.code,
      detail: this.message,
      remedy: this.remedy,
      ...(this.errors ? { errors: [...this.errors] } : {}),
    };
  }
}

/** 401: nobody is signed in, or the session or token has ended. */
export class NotSignedIn extends HttpProblem {
  constructor(detail = "This needs a signed-in account.") {
    super({
      status: 401,
      code: "not-signed-in",
      title: "Not signed in",
      detail,
      remedy: "Sign in, or send a valid bearer token.",
    });
  }
}

/** 403: the role does not allow it. `code` may be narrowed where the caller can act on it. */
export class Denied extends HttpProblem {
  constructor(
    detail = "Your role does not allow this.",
    remedy = "Ask an administrator of your organisation.",
    code = "denied",
  ) {
    super({ status: 403, code, title: "Not allowed", detail, remedy });
  }
}

/** 404: absent, or another organisation's: the answer does not tell which. `what` as in "site". */
export class NotFound extends HttpProblem {
  constructor(what: string) {
    super({
      status: 404,
      code: "not-found",
      title: "Not found",
      detail: `There is no such ${what}.`,
      remedy: "Check the address; it may have been removed.",
    });
  }
}

/** 409: right in itself, but the state of things forbids it. */
export class Conflict extends HttpProblem {
  constructor(code: string, detail: string, remedy: string) {
    super({ status: 409, code, title: "Conflict", detail, remedy });
  }
}

/** 422: the input breaks the contract or a rule; one entry per field. */
export class Invalid extends HttpProblem {
  constructor(
    errors: readonly FieldError[],
    detail = "Some of what was sent cannot be used.",
    code = "invalid",
  ) {
    super({
      status: 422,
      code,
      title: "Invalid input",
      detail,
      remedy: "Correct the fields named in errors and send it again.",
      errors,
    });
  }

  /** One wrong field of the body; `path` such as "zone" or "fluid/percent". */
  static field(path: string, code: string, message: string): Invalid {
    return new Invalid([{ pointer: `/body/${path}`, code, message }]);
  }
}

/** 410: a link that was good once. */
export class Gone extends HttpProblem {
  constructor(code: string, detail: string, remedy: string) {
    super({ status: 410, code, title: "No longer valid", detail, remedy });
  }
}

/** 413: more bytes than this endpoint takes. */
export class TooLarge extends HttpProblem {
  constructor(detail: string, remedy: string) {
    super({ status: 413, code: "too-large", title: "Too large", detail, remedy });
  }
}

/** 429: too often; tells when to come back. */
export class RateLimited extends HttpProblem {
  constructor(retryAfterSeconds: number) {
    const seconds = Math.max(1, Math.ceil(retryAfterSeconds));
    const minutes = Math.ceil(seconds / 60);
    super({
      status: 429,
      code: "rate-limited",
      title: "Too many attempts",
      detail: "There were too many attempts in a short time.",
      remedy: `Wait ${minutes} ${minutes === 1 ? "minute" : "minutes"} and try again.`,
      headers: { "Retry-After": String(seconds) },
    });
  }
}
