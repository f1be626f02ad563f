import { Op } from "sequelize";
import { linkWithSecret, newPasswordPath } from "@shared/links/people-links";
import { inTransaction } from "@server/database/transaction";
import type { PublicContext } from "@server/http/context";
import { passwordResetLetter } from "@server/mail/people-letters";
import { queueLetter } from "@server/mail/queue-letter";
import { Account } from "@server/models/account";
import { Membership } from "@server/models/membership";
import { PasswordReset } from "@server/models/password-reset";
import { newSecret, secretHash } from "@server/security/secrets";
import { recordAudit } from "./record-audit";

const linkLivesMs = 3_600_000;
/** More letters an hour to one person would be a nuisance somebody else can cause. */
const lettersPerHour = 3;

/** Sends a reset link if the address belongs to an active member. It never tells whether it did. */
export async function requestReset(context: PublicContext, email: string): Promise<void> {
  const { database, clock, config } = context;
  const account = await Account.findOne({ where: { email } });
  const isActive =
    account !== null &&
    (await Membership.count({ where: { accountId: account.id, state: "active" } })) > 0;
  if (!isActive) return;
  const now = clock.date();
  const hourAgo = new Date(now.getTime() - linkLivesMs);
  const recent = await PasswordReset.count({
    where: { accountId: account.id, createdAt: { [Op.gt]: hourAgo } },
  });
  if (recent >= lettersPerHour) return;
  const secret = newSecret();
  await inTransaction(database, async (transaction) => {
    await PasswordReset.create(
      {
        accountId: account.id,
        secretHash: secretHash(secret),
        createdAt: now,
        expiresAt: new Date(now.getTime() + linkLivesMs),
      },
      { transaction },
    );
    const url = linkWithSecret(config.publicUrl, newPasswordPath, secret);
    const { language, name } = account;
    await queueLetter(
      passwordResetLetter({ language, name, url }),
      { address: account.email, organisationId: null },
      clock,
      transaction,
    );
    const by = { accountId: account.id, name: account.name, organisationId: null };
    await recordAudit(
      { ...context, actor: null },
      { kind: "password-reset-requested", by },
      transaction,
    );
  });
}
