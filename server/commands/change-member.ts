import { Op, type Transaction } from "sequelize";
import type { Role } from "@shared/contracts/people";
import type { Scope } from "@server/database/scoped";
import { inTransaction } from "@server/database/transaction";
import type { Context } from "@server/http/context";
import { Conflict } from "@server/http/errors";
import { AccessToken } from "@server/models/access-token";
import { Invitation } from "@server/models/invitation";
import { Membership } from "@server/models/membership";
import { findMember } from "@server/queries/members";
import { endSessions } from "@server/security/sessions";
import { lockOrganisation } from "./lock-organisation";
import { recordAudit } from "./record-audit";

interface Change {
  readonly role?: Role | undefined;
  readonly state?: "active" | "disabled" | undefined;
}

/**
 * Changes a member's role, or disables and enables them; a disabled member's sessions end at once.
 * @throws Conflict (409) last-administrator, invitation-open.
 */
export function changeMember(context: Context, id: string, change: Change): Promise<Membership> {
  const { scope, database, clock } = context;
  return inTransaction(database, async (transaction) => {
    await lockOrganisation(scope, transaction);
    const member = await findMember(scope, id, transaction);
    if (change.state !== undefined && member.state === "invited")
      throw new Conflict(
        "invitation-open",
        "This person has not accepted the invitation yet.",
        "Withdraw the invitation, or wait until it is accepted.",
      );
    const next = {
      role: change.role ?? member.role,
      state: change.state ?? member.state,
    };
    if (next.role !== "administrator" || next.state !== "active")
      await requireAnotherAdministrator(scope, member, transaction);
    const before = { role: member.role, state: member.state };
    await member.update(next, { transaction });
    if (next.state === "disabled")
      await endSessions({ membershipId: id }, clock.date(), transaction);
    await recordAudit(
      context,
      { kind: "member-changed", subject: { kind: "member", id }, details: { before, after: next } },
      transaction,
    );
    return findMember(scope, id, transaction);
  });
}

/**
 * Removes a member or withdraws an invitation. The row stays for what refers to it; sessions, tokens
 * and the invitation's link end.
 * @throws Conflict (409) last-administrator.
 */
export function removeMembership(context: Context, id: string): Promise<void> {
  const { scope, database, clock } = context;
  return inTransaction(database, async (transaction) => {
    await lockOrganisation(scope, transaction);
    const member = await findMember(scope, id, transaction);
    await requireAnotherAdministrator(scope, member, transaction);
    const wasInvited = member.state === "invited";
    await member.update({ state: "removed" }, { transaction });
    await Invitation.destroy({ where: { membershipId: id }, transaction });
    await endSessions({ membershipId: id }, clock.date(), transaction);
    await AccessToken.update(
      { revokedAt: clock.date() },
      { where: { membershipId: id, revokedAt: null }, transaction },
    );
    const kind = wasInvited ? "invitation-withdrawn" : "member-removed";
    await recordAudit(context, { kind, subject: { kind: "member", id } }, transaction);
  });
}

/** An organisation without an administrator could never let anybody in again. */
async function requireAnotherAdministrator(
  scope: Scope,
  member: Membership,
  transaction: Transaction,
): Promise<void> {
  if (member.role !== "administrator" || member.state !== "active") return;
  const others = await scope.count(Membership, {
    where: { role: "administrator", state: "active", id: { [Op.ne]: member.id } },
    transaction,
  });
  if (others === 0)
    throw new Conflict(
      "last-administrator",
      "This is the organisation's only active administrator.",
      "Make somebody else administrator first.",
    );
}
