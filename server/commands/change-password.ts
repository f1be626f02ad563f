import type { Transaction } from "sequelize";
import { inTransaction } from "@server/database/transaction";
import type { Context, PublicContext } from "@server/http/context";
import { Gone, Invalid, NotSignedIn } from "@server/http/errors";
import { passwordChangedLetter } from "@server/mail/people-letters";
import { queueLetter } from "@server/mail/queue-letter";
import { Account } from "@server/models/account";
import { PasswordReset } from "@server/models/password-reset";
import { endSessions } from "@server/security/sessions";
import { secretHash } from "@server/security/secrets";
import { clearSignInFailures, takeSignInAttempt } from "@server/security/sign-in-limit";
import { recordAudit } from "./record-audit";

/**
 * Sets a new password after proving the current one; other sessions end.
 * @throws Invalid (422, wrong-password), RateLimited (429) after too many wrong ones.
 */
export async function changeOwnPassword(
  context: Context,
  given: { currentPassword: string; newPassword: string },
): Promise<void> {
  const { actor, services, database, clock } = context;
  const account = await Account.findByPk(actor.accountId);
  if (account === null) throw new NotSignedIn();
  await takeSignInAttempt(account.email, services);
  if (!(await services.passwords.matches(given.currentPassword, account.passwordHash)))
    throw Invalid.field("currentPassword", "wrong-password", "This is not the current password.");
  await clearSignInFailures(account.email);
  const passwordHash = await services.passwords.hash(given.newPassword);
  await inTransaction(database, async (transaction) => {
    await account.update({ passwordHash }, { transaction });
    await spendOpenResets(account.id, clock.date(), transaction);
    await endSessions(
      { accountId: account.id, except: actor.sessionId },
      clock.date(),
      transaction,
    );
    await recordAudit(context, { kind: "password-changed" }, transaction);
    await tellOwner(context, account, transaction);
  });
}

function expiredLink(): Gone {
  return new Gone(
    "link-not-valid",
    "This link has been used, has expired or was never valid.",
    "Ask for a new link from the sign-in page.",
  );
}

/**
 * Sets a new password with the secret of a reset letter, which works once within its hour; every
 * session of the account ends.
 * @throws Gone (410, link-not-valid).
 */
export async function resetForgottenPassword(
  context: PublicContext,
  given: { secret: string; newPassword: string },
): Promise<void> {
  const { services, database, clock } = context;
  const where = { secretHash: secretHash(given.secret), usedAt: null };
  const known = await PasswordReset.findOne({ where });
  if (known === null || known.expiresAt <= clock.date()) throw expiredLink();
  const passwordHash = await services.passwords.hash(given.newPassword);
  const account = await inTransaction(database, async (transaction) => {
    const reset = await PasswordReset.findOne({
      where,
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    const owner = reset && (await Account.findByPk(reset.accountId, { transaction }));
    if (!owner) throw expiredLink();
    await spendOpenResets(owner.id, clock.date(), transaction);
    await owner.update({ passwordHash }, { transaction });
    await endSessions({ accountId: owner.id }, clock.date(), transaction);
    const by = { accountId: owner.id, name: owner.name, organisationId: null };
    await recordAudit({ ...context, actor: null }, { kind: "password-reset", by }, transaction);
    await tellOwner(context, owner, transaction);
    return owner;
  });
  await clearSignInFailures(account.email);
}

async function spendOpenResets(accountId: string, now: Date, transaction: Transaction) {
  await PasswordReset.update({ usedAt: now }, { where: { accountId, usedAt: null }, transaction });
}

function tellOwner({ clock }: PublicContext, account: Account, transaction: Transaction) {
  return queueLetter(
    passwordChangedLetter(account),
    { address: account.email, organisationId: null },
    clock,
    transaction,
  );
}
