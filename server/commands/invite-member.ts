import { Op, type Transaction } from "sequelize";
import type { Role } from "@shared/contracts/people";
import { invitationPath, linkWithSecret } from "@shared/links/people-links";
import { inTransaction } from "@server/database/transaction";
import type { Context } from "@server/http/context";
import { Conflict } from "@server/http/errors";
import { invitationLetter } from "@server/mail/people-letters";
import { queueLetter } from "@server/mail/queue-letter";
import { Account } from "@server/models/account";
import { Invitation } from "@server/models/invitation";
import { Membership } from "@server/models/membership";
import { Organisation } from "@server/models/organisation";
import { newSecret, secretHash } from "@server/security/secrets";
import { findMember } from "@server/queries/members";
import { lockOrganisation } from "./lock-organisation";
import { recordAudit } from "./record-audit";

const linkLivesDays = 7;

/**
 * Invites somebody by e-mail; the link in the letter works once within seven days. Somebody who was
 * removed before gets their old row back, so what they did stays theirs.
 * @throws Conflict (409) already-member or already-invited.
 */
export async function inviteByEmail(
  context: Context,
  { email, role }: { email: string; role: Role },
): Promise<Membership> {
  const { scope, database, clock } = context;
  return inTransaction(database, async (transaction) => {
    await lockOrganisation(scope, transaction);
    const earlier = await membershipOf(context, email, transaction);
    refuseSecond(earlier);
    const values = {
      role,
      state: "invited" as const,
      invitedEmail: email,
      invitedAt: clock.date(),
    };
    const member = earlier
      ? await earlier.update(values, { transaction })
      : await scope.create(Membership, { ...values, createdAt: clock.date() }, { transaction });
    await sendInvitation(context, member, transaction);
    const subject = { kind: "member", id: member.id };
    await recordAudit(
      context,
      { kind: "member-invited", subject, details: { email, role } },
      transaction,
    );
    return findMember(scope, member.id, transaction);
  });
}

/**
 * Sends a fresh link; the earlier one stops working.
 * @throws Conflict (409) when the invitation has been accepted.
 */
export async function inviteAgain(context: Context, memberId: string): Promise<Membership> {
  const { scope, database } = context;
  return inTransaction(database, async (transaction) => {
    await lockOrganisation(scope, transaction);
    const member = await findMember(scope, memberId, transaction);
    if (member.state !== "invited")
      throw new Conflict(
        "invitation-accepted",
        "This invitation has been accepted.",
        "There is nothing to send.",
      );
    await member.update({ invitedAt: context.clock.date() }, { transaction });
    await sendInvitation(context, member, transaction);
    const subject = { kind: "member", id: member.id };
    await recordAudit(context, { kind: "invitation-resent", subject }, transaction);
    return findMember(scope, member.id, transaction);
  });
}

async function membershipOf({ scope }: Context, email: string, transaction: Transaction) {
  const account = await Account.findOne({ where: { email }, transaction });
  return scope.find(Membership, {
    where: {
      [Op.or]: [{ invitedEmail: email }, ...(account ? [{ accountId: account.id }] : [])],
    },
    transaction,
  });
}

function refuseSecond(earlier: Membership | null): void {
  if (earlier === null || earlier.state === "removed") return;
  throw earlier.state === "invited"
    ? new Conflict(
        "already-invited",
        "This person has an open invitation.",
        "Send the invitation again instead.",
      )
    : new Conflict(
        "already-member",
        "This person is a member already.",
        "Change their role, or enable them again.",
      );
}

async function sendInvitation(context: Context, member: Membership, transaction: Transaction) {
  const { actor, scope, clock, config } = context;
  const now = clock.date();
  const secret = newSecret();
  await Invitation.destroy({ where: { membershipId: member.id }, transaction });
  await scope.create(
    Invitation,
    {
      membershipId: member.id,
      secretHash: secretHash(secret),
      createdAt: now,
      expiresAt: new Date(now.getTime() + linkLivesDays * 86_400_000),
    },
    { transaction },
  );
  const [inviter, organisation] = await Promise.all([
    Account.findByPk(actor.accountId, { transaction }),
    Organisation.findByPk(scope.organisationId, { transaction }),
  ]);
  const letter = invitationLetter({
    language: inviter?.language ?? "en",
    inviter: actor.accountName,
    organisation: organisation?.name ?? "",
    role: member.role,
    url: linkWithSecret(config.publicUrl, invitationPath, secret),
    days: linkLivesDays,
  });
  const address = member.invitedEmail ?? "";
  await queueLetter(letter, { address, organisationId: scope.organisationId }, clock, transaction);
}
