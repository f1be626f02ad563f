import type { ErrorRequestHandler } from "express";
import type { Logger } from "pino";
import { ConnectionAcquireTimeoutError, ConnectionError } from "sequelize";
import { HttpProblem, Invalid, TooLarge } from "./errors";

/** Refusals of the libraries in front of the handlers, in our words. */
function known(error: unknown): HttpProblem | null {
  if (error instanceof HttpProblem) return error;
  const type = typeof error === "object" && error !== null && "type" in error ? error.type : null;
  if (type === "entity.parse.failed")
    return new Invalid(
      [{ pointer: "/body", code: "not-json", message: "The body is not valid JSON." }],
      "The body is not valid JSON.",
      "not-json",
    );
  if (type === "entity.too.large")
    return new TooLarge("The body is larger than 1 MB.", "Send less at a time.");
  if (error instanceof URIError)
    return new HttpProblem({
      status: 400,
      code: "bad-address",
      title: "Bad address",
      detail: "The address holds a broken % sequence.",
      remedy: "Encode the address again.",
    });
  if (error instanceof ConnectionError || error instanceof ConnectionAcquireTimeoutError)
    return new HttpProblem({
      status: 503,
      code: "database-unavailable",
      title: "Not available right now",
      detail: "The database does not answer at the moment.",
      remedy: "Try again in a few seconds; nothing of this request was kept.",
      headers: { "Retry-After": "5" },
    });
  return null;
}

function unexpected(): HttpProblem {
  return new HttpProblem({
    status: 500,
    code: "internal",
    title: "Something went wrong here",
    detail: "The server could not finish this because of a fault of its own.",
    remedy: "Try again; if it stays, tell whoever runs this server the time it happened.",
  });
}

/** The one place where errors become answers. What was not foreseen is logged, never shown. */
export function answerErrors(log: Logger): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    const problem = known(error) ?? unexpected();
    if (problem.status >= 500) log.error({ err: error, path: request.path }, "request failed");
    if (response.headersSent) {
      // A broken stream cannot be turned into a problem document: cut it, so nobody takes half an
      // answer for a whole one.
      next(error);
      return;
    }
    response
      .status(problem.status)
      .set({ ...problem.headers, "Cache-Control": "no-store" })
      .type("application/problem+json")
      .send(JSON.stringify(problem.toDocument()));
  };
}
