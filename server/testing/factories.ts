import { randomBytes } from "node:crypto";
import { hashSync } from "bcryptjs";
import supertest from "supertest";
import type { Role } from "@shared/contracts/people";
import { Account } from "@server/models/account";
import { Membership } from "@server/models/membership";
import { Organisation } from "@server/models/organisation";
import { Session } from "@server/models/session";
import { guardHeader } from "@server/security/request-guard";
import { cookieName, signSession } from "@server/security/session-cookie";
import type { TestApp } from "./test-app";

/** The password of every account made here. */
export const testPassword = "warm return, cold supply";

let passwordHash: string | undefined;
let count = 0;

/** An organisation with nothing in it. */
export function organisation(app: TestApp, name?: string): Promise<Organisation> {
  count += 1;
  return Organisation.create({
    name: name ?? `Organisation ${count}`,
    createdAt: app.clock.date(),
  });
}

export interface Person {
  readonly account: Account;
  readonly membership: Membership;
  readonly organisationId: string;
}

interface PersonWishes {
  role?: Role;
  /** An organisation's id; a new organisation is made without it. */
  organisationId?: string;
  email?: string;
  name?: string;
}

/** An account with an active membership; an engineer unless wished otherwise. */
export async function person(app: TestApp, wishes: PersonWishes = {}): Promise<Person> {
  count += 1;
  passwordHash ??= hashSync(testPassword, 4);
  const organisationId = wishes.organisationId ?? (await organisation(app)).id;
  const role = wishes.role ?? "engineer";
  const account = await Account.create({
    email: wishes.email ?? `${role.toLowerCase()}-${count}@example.org`,
    name: wishes.name ?? `Person ${count}`,
    passwordHash,
    createdAt: app.clock.date(),
  });
  const membership = await Membership.create({
    organisationId,
    accountId: account.id,
    role,
    state: "active",
    createdAt: app.clock.date(),
  });
  return { account, membership, organisationId };
}

/** Calls the API as somebody, cookie and guard header included; paths are relative to /api/v1. */
export interface Agent extends Person {
  readonly cookie: string;
  readonly sessionId: string;
  get(path: string): supertest.Test;
  post(path: string, body?: object): supertest.Test;
  put(path: string, body?: object): supertest.Test;
  patch(path: string, body?: object): supertest.Test;
  delete(path: string): supertest.Test;
}

/** Somebody signed in, without the cost of signing in over HTTP. */
export async function signedIn(app: TestApp, wishes: PersonWishes = {}): Promise<Agent> {
  return sessionOf(app, await person(app, wishes));
}

/** A further session of somebody who exists. */
export async function sessionOf(app: TestApp, who: Person): Promise<Agent> {
  const now = app.clock.date();
  const session = await Session.create({
    id: randomBytes(16).toString("hex"),
    membershipId: who.membership.id,
    accountId: who.account.id,
    organisationId: who.organisationId,
    createdAt: now,
    lastSeenAt: now,
    expiresAt: new Date(now.getTime() + 30 * 86_400_000),
  });
  const cookie = `${cookieName}=${signSession(app.config, session)}`;
  const call = (method: "get" | "post" | "put" | "patch" | "delete", path: string) =>
    supertest(app.express)[method](`/api/v1${path}`).set("Cookie", cookie).set(guardHeader, "1");
  return {
    ...who,
    cookie,
    sessionId: session.id,
    get: (path) => call("get", path),
    post: (path, body) => call("post", path).send(body),
    put: (path, body) => call("put", path).send(body),
    patch: (path, body) => call("patch", path).send(body),
    delete: (path) => call("delete", path),
  };
}
