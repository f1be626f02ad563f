import type { Transaction } from "sequelize";
import { inTransaction } from "@server/database/transaction";
import type { PublicContext } from "@server/http/context";
import { Gone, Invalid } from "@server/http/errors";
import { Account } from "@server/models/account";
import { Invitation } from "@server/models/invitation";
import { Membership } from "@server/models/membership";
import type { Actor } from "@server/policies/actor";
import { secretHash } from "@server/security/secrets";
import { clearSignInFailures, takeSignInAttempt } from "@server/security/sign-in-limit";
import { recordAudit } from "./record-audit";
import { enter } from "./sign-in";

/** The open invitation of a link. @throws Gone (410, link-not-valid). */
export async function openInvitation(
  secret: string,
  now: Date,
  transaction?: Transaction,
): Promise<{ invitation: Invitation; member: Membership; email: string }> {
  const invitation = await Invitation.findOne({
    where: { secretHash: secretHash(secret) },
    transaction,
    ...(transaction ? { lock: transaction.LOCK.UPDATE } : {}),
  });
  const member =
    invitation && invitation.expiresAt > now
      ? await Membership.findByPk(invitation.membershipId, { transaction })
      : null;
  if (!invitation || member?.state !== "invited" || member.invitedEmail === null)
    throw new Gone(
      "link-not-valid",
      "This invitation has been used, has expired or was withdrawn.",
      "Ask whoever invited you to send it again.",
    );
  return { invitation, member, email: member.invitedEmail };
}

/**
 * Accepts an invitation and signs in. Somebody with an account in another organisation proves it
 * with its password, which stays as it is; the name given then is not used.
 * @throws Gone (410), Invalid (422, wrong-password), RateLimited (429).
 */
export async function acceptByLink(
  context: PublicContext,
  given: { secret: string; name: string; password: string },
): Promise<Actor> {
  const { services, database, clock, request } = context;
  const { email } = await openInvitation(given.secret, clock.date());
  const known = await Account.findOne({ where: { email } });
  if (known) await proveOwnership(context, known, given.password);
  const passwordHash = known ? "" : await services.passwords.hash(given.password);
  const language = request.acceptsLanguages("en", "de") === "de" ? "de" : "en";
  const { account, member } = await inTransaction(database, async (transaction) => {
    const open = await openInvitation(given.secret, clock.date(), transaction);
    const account =
      known ??
      (await Account.create(
        { email, name: given.name, passwordHash, language, createdAt: clock.date() },
        { transaction },
      ));
    await open.invitation.destroy({ transaction });
    const member = await open.member.update(
      { accountId: account.id, state: "active" },
      { transaction },
    );
    const { id, organisationId } = member;
    const by = { accountId: account.id, name: account.name, organisationId };
    await recordAudit(
      { ...context, actor: null },
      { kind: "invitation-accepted", subject: { kind: "member", id }, by },
      transaction,
    );
    return { account, member };
  });
  return enter(context, account, member);
}

async function proveOwnership({ services }: PublicContext, account: Account, password: string) {
  await takeSignInAttempt(account.email, services);
  if (!(await services.passwords.matches(password, account.passwordHash)))
    throw Invalid.field(
      "password",
      "wrong-password",
      "This is not the password of your existing account.",
    );
  await clearSignInFailures(account.email);
}
