import type { Session } from "@shared/contracts/people";
import type { Config } from "@server/config";
import type { Account } from "@server/models/account";
import type { Organisation } from "@server/models/organisation";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";

/** Who is signed in and what they may do; screens ask `can`, never the role. */
export function presentSession(
  { account, organisation, actor }: { account: Account; organisation: Organisation; actor: Actor },
  config: Config,
): Session {
  const abilities = can(actor);
  return {
    account: {
      id: account.id,
      name: account.name,
      email: account.email,
      language: account.language,
      unitSystem: account.unitSystem,
    },
    organisation: { id: organisation.id, name: organisation.name },
    role: actor.role,
    can: {
      seeSites: abilities.seeSites,
      editSites: abilities.editSites,
      editPoints: abilities.editPoints,
      importLogs: abilities.importLogs,
      manageMembers: abilities.manageMembers,
      manageTokens: abilities.manageTokens,
      seeMail: abilities.readCaughtMail && config.mailFakePort !== null,
    },
  };
}
