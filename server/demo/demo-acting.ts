import type { Role } from "@shared/contracts/people";
import { scoped } from "@server/database/scoped";
import type { Acting } from "@server/commands/acting";
import { Account } from "@server/models/account";
import { Membership } from "@server/models/membership";
import type { Organisation } from "@server/models/organisation";
import type { Services } from "@server/services";

/**
 * The demo's person of a role, to act through the commands that the endpoints use: what the demo
 * holds then has a maker, like everything else.
 * @throws Error where the demo's people are not made yet.
 */
export async function demoActing(
  { database, clock }: Services,
  { id: organisationId }: Organisation,
  role: Role,
): Promise<Acting> {
  const members = await Membership.findAll({ where: { organisationId, role, state: "active" } });
  const accountIds = members.flatMap(({ accountId }) => accountId ?? []);
  const account = await Account.findOne({
    where: { id: accountIds, isDemo: true },
    order: [["id", "ASC"]],
  });
  const membership = members.find(({ accountId }) => accountId === account?.id);
  if (account === null || membership === undefined)
    throw new Error(`The demo has no ${role}: make its people first.`);
  return {
    database,
    clock,
    scope: scoped(organisationId),
    actor: {
      accountId: account.id,
      accountName: account.name,
      organisationId,
      membershipId: membership.id,
      role,
      via: "session",
      sessionId: null,
    },
  };
}
