import type { Request, Response } from "express";
import type { Logger } from "pino";
import type { Clock } from "@server/clock";
import type { Config } from "@server/config";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import type { Actor } from "@server/policies/actor";
import type { Services } from "@server/services";

/** What a handler works with when nobody need be signed in. */
export interface PublicContext {
  /** Who is signed in, if anybody. */
  readonly actor: Actor | null;
  readonly config: Config;
  readonly database: Database;
  readonly clock: Clock;
  readonly log: Logger;
  readonly services: Services;
  /** Only for cookies, uploads (`request.files`) and the like; input comes validated. */
  readonly request: Request;
  readonly response: Response;
}

/** What a handler works with behind a policy that needs a signed-in account. */
export interface Context extends PublicContext {
  readonly actor: Actor;
  /** The door to this organisation's rows, and only to them. */
  readonly scope: Scope;
}
