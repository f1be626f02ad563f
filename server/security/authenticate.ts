import type { Request } from "express";
import { QueryTypes } from "sequelize";
import type { Role } from "@shared/contracts/people";
import type { Database } from "@server/database/connect";
import type { Actor } from "@server/policies/actor";
import type { Services } from "@server/services";
import { NotSignedIn } from "@server/http/errors";
import { tokenPrefix } from "./access-token-secret";
import { demoAccountsAllowed } from "./demo-accounts-allowed";
import { cookieName, readSessionCookie } from "./session-cookie";
import { secretHash } from "./secrets";

interface ActorRow {
  id: string;
  accountId: string;
  accountName: string;
  organisationId: string;
  membershipId: string;
  role: Role;
  lastUsedAt: Date | null;
}

/** Being seen is noted at most once a minute: a write per request would cost more than it tells. */
const noteEveryMs = 60_000;

/**
 * Who asks. A bearer token wins over a cookie; a bad bearer token is refused rather than taken for
 * nobody, so that a script learns of it. A dead cookie counts as nobody.
 * @throws NotSignedIn for a bearer token that is unknown, expired, revoked or its maker's no longer.
 */
export async function authenticate(request: Request, services: Services): Promise<Actor | null> {
  const bearer = bearerOf(request);
  if (bearer !== null) return actorOfToken(bearer, services);
  const cookie: unknown = request.cookies?.[cookieName];
  return typeof cookie === "string" ? actorOfSession(cookie, services) : null;
}

export function bearerOf(request: Request): string | null {
  const match = /^Bearer +(\S+) *$/i.exec(request.get("authorization") ?? "");
  return match?.[1] ?? null;
}

async function actorOfSession(cookie: string, services: Services): Promise<Actor | null> {
  const { config, clock, database } = services;
  const sessionId = readSessionCookie(cookie, config, clock.now());
  if (sessionId === null) return null;
  const now = clock.date();
  const row = await one(
    database,
    `SELECT s.id, a.id AS accountId, a.name AS accountName, m.organisation_id AS organisationId,
            m.id AS membershipId, m.role, s.last_seen_at AS lastUsedAt
       FROM session s
       JOIN membership m ON m.id = s.membership_id AND m.state = 'active'
       JOIN account a ON a.id = s.account_id AND (NOT a.is_demo OR :demoAllowed)
      WHERE s.id = :key AND s.revoked_at IS NULL AND s.expires_at > :now`,
    { key: sessionId, now, demoAllowed: demoAccountsAllowed(config) },
  );
  if (row === null) return null;
  if (isDue(row.lastUsedAt, now)) await noteSeen(database, "session", row, now);
  return toActor(row, "session");
}

async function actorOfToken(secret: string, services: Services): Promise<Actor> {
  const { config, clock, database } = services;
  const now = clock.date();
  const row = secret.startsWith(tokenPrefix)
    ? await one(
        database,
        `SELECT t.id, a.id AS accountId, a.name AS accountName, m.organisation_id AS organisationId,
                m.id AS membershipId, m.role, t.last_used_at AS lastUsedAt
           FROM access_token t
           JOIN membership m ON m.id = t.membership_id AND m.state = 'active'
           JOIN account a ON a.id = m.account_id AND (NOT a.is_demo OR :demoAllowed)
          WHERE t.secret_hash = :key AND t.revoked_at IS NULL
            AND (t.expires_at IS NULL OR t.expires_at > :now)`,
        { key: secretHash(secret), now, demoAllowed: demoAccountsAllowed(config) },
      )
    : null;
  if (row === null)
    throw new NotSignedIn("The bearer token is not known here, has expired or was revoked.");
  if (isDue(row.lastUsedAt, now)) await noteSeen(database, "access_token", row, now);
  return toActor(row, "token");
}

async function one(
  database: Database,
  sql: string,
  replacements: { key: string; now: Date; demoAllowed: boolean },
): Promise<ActorRow | null> {
  const rows = await database.query<ActorRow>(sql, { replacements, type: QueryTypes.SELECT });
  return rows[0] ?? null;
}

function toActor(row: ActorRow, via: Actor["via"]): Actor {
  return {
    accountId: row.accountId,
    accountName: row.accountName,
    organisationId: row.organisationId,
    membershipId: row.membershipId,
    role: row.role,
    via,
    sessionId: via === "session" ? row.id : null,
  };
}

function isDue(last: Date | null, now: Date): boolean {
  return last === null || now.getTime() - last.getTime() >= noteEveryMs;
}

async function noteSeen(
  database: Database,
  table: "session" | "access_token",
  row: ActorRow,
  now: Date,
): Promise<void> {
  const column = table === "session" ? "last_seen_at" : "last_used_at";
  await database.query(
    `UPDATE ${table} used JOIN membership m ON m.id = used.membership_id
        SET used.${column} = :now, m.last_seen_at = :now WHERE used.id = :id`,
    { replacements: { now, id: row.id } },
  );
}
