import type { Context } from "@server/http/context";
import { AccessToken } from "@server/models/access-token";
import { newAccessTokenSecret } from "@server/security/access-token-secret";
import { secretHash } from "@server/security/secrets";
import { recordAudit } from "./record-audit";

/** Makes a bearer token that acts as its maker. The secret is in the answer and nowhere else. */
export async function makeAccessToken(
  context: Context,
  given: { name: string; expiresInDays: number | null },
): Promise<{ token: AccessToken; secret: string }> {
  const { actor, scope, clock } = context;
  const secret = newAccessTokenSecret();
  const token = await scope.create(AccessToken, {
    membershipId: actor.membershipId,
    name: given.name,
    secretHash: secretHash(secret),
    createdAt: clock.date(),
    expiresAt:
      given.expiresInDays === null
        ? null
        : new Date(clock.now() + given.expiresInDays * 86_400_000),
  });
  const subject = { kind: "access-token", id: token.id };
  await recordAudit(context, { kind: "token-made", subject, details: { name: token.name } });
  return { token, secret };
}

/** Ends a token at once. @throws NotFound when there is none, or it was revoked before. */
export async function endAccessToken(context: Context, id: string): Promise<void> {
  const { scope, clock } = context;
  const token = await scope.get(AccessToken, id, "access token", { where: { revokedAt: null } });
  await token.update({ revokedAt: clock.date() });
  const subject = { kind: "access-token", id };
  await recordAudit(context, { kind: "token-revoked", subject, details: { name: token.name } });
}
