import { ConnectionError, DatabaseError } from "sequelize";
import type { Failure } from "@server/models/log-import";

/** What a worker tells of a job when it lets go of it. Plain data: it crosses threads. */
export type JobOutcome =
  /** Its effects and its end are committed together. */
  | { readonly kind: "done" }
  /** It cannot succeed however often it runs. */
  | { readonly kind: "refused"; readonly failure: Failure }
  /** Something unforeseen; worth another try. */
  | { readonly kind: "error"; readonly message: string; readonly stack: string | null }
  /** Told to stop: somebody cancelled it, or another server holds it now. Nothing to record. */
  | { readonly kind: "dropped" }
  /** Told to stop because the server ends: somebody else shall take it. */
  | { readonly kind: "handedBack" };

/** Thrown by a job's work for what a person has to put right; ends the job as failed. */
export class JobRefused extends Error {
  constructor(readonly failure: Failure) {
    super(failure.detail);
    this.name = "JobRefused";
  }
}

/** Thrown at a checkpoint when the job is no longer wanted or no longer ours. */
export class JobDropped extends Error {
  constructor() {
    super("the job was cancelled or taken over");
    this.name = "JobDropped";
  }
}

/** Thrown at a checkpoint when the server is about to end. */
export class JobHandedBack extends Error {
  constructor() {
    super("the server stops");
    this.name = "JobHandedBack";
  }
}

const lostConnection = new Set([
  "ECONNREFUSED",
  "ECONNRESET",
  "EPIPE",
  "ER_SOCKET_UNEXPECTED_CLOSE",
  "ER_CMD_CONNECTION_CLOSED",
  "ER_CONNECTION_ALREADY_CLOSED",
  "ER_CONNECTION_TIMEOUT",
  "ER_SERVER_SHUTDOWN",
  "ER_SOCKET_DESTROYED",
]);

function codeOf(error: unknown): string | null {
  if (typeof error !== "object" || error === null) return null;
  if ("code" in error && typeof error.code === "string") return error.code;
  return null;
}

/**
 * Whether the database went away, rather than refused what it was asked. The connector says so in
 * several ways, depending on which end of the connection noticed first.
 */
export function isDatabaseAway(error: unknown): boolean {
  if (error instanceof ConnectionError) return true;
  const parent = error instanceof DatabaseError ? error.parent : error;
  const code = codeOf(parent);
  if (code !== null && lostConnection.has(code)) return true;
  const message = parent instanceof Error ? parent.message : "";
  return /connection is closed|socket has unexpectedly been closed|server shutdown in progress|ended: no connection/i.test(
    message,
  );
}
