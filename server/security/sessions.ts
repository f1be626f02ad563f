import { randomBytes } from "node:crypto";
import type { Request } from "express";
import { Op, type Transaction } from "sequelize";
import { Session } from "@server/models/session";

/** A session lives this long after signing in; being seen does not prolong it. */
export const sessionDays = 30;

/** Starts a session of a membership; the caller hands out its cookie. */
export function startSession(
  of: { membershipId: string; accountId: string; organisationId: string },
  request: Request,
  now: Date,
  transaction?: Transaction,
): Promise<Session> {
  return Session.create(
    {
      id: randomBytes(16).toString("hex"),
      ...of,
      userAgent: request.get("user-agent")?.slice(0, 200) ?? null,
      createdAt: now,
      lastSeenAt: now,
      expiresAt: new Date(now.getTime() + sessionDays * 86_400_000),
    },
    { transaction },
  );
}

/** Ends the sessions that fit, at once. Answers how many there were. */
export async function endSessions(
  which: { id: string } | { accountId: string; except?: string | null } | { membershipId: string },
  now: Date,
  transaction?: Transaction,
): Promise<number> {
  const where =
    "accountId" in which
      ? {
          accountId: which.accountId,
          ...(which.except ? { id: { [Op.ne]: which.except } } : {}),
        }
      : which;
  const [ended] = await Session.update(
    { revokedAt: now },
    { where: { ...where, revokedAt: null }, transaction },
  );
  return ended;
}
