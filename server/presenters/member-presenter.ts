import type { Member } from "@shared/contracts/people";
import { instantTextOrNull } from "@server/database/conversions";
import type { Membership } from "@server/models/membership";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";

/** Expects the membership with its account and invitation loaded (queries/members). */
export function presentMember(membership: Membership, actor: Actor): Member {
  const { id, role, state, account, invitation } = membership;
  if (state === "removed") throw new Error(`membership ${id} was removed and is not shown`);
  const isInvited = state === "invited";
  const abilities = can(actor);
  return {
    id,
    name: isInvited ? null : (account?.name ?? null),
    email: (isInvited ? membership.invitedEmail : account?.email) ?? "",
    role,
    state,
    invitedAt: instantTextOrNull(membership.invitedAt),
    invitationExpiresAt: isInvited ? instantTextOrNull(invitation?.expiresAt ?? null) : null,
    lastSeenAt: instantTextOrNull(membership.lastSeenAt),
    isSelf: id === actor.membershipId,
    can: { edit: abilities.editMember(membership), remove: abilities.removeMember(membership) },
  };
}
