import type { PublicContext } from "@server/http/context";
import { NotSignedIn } from "@server/http/errors";
import { Account } from "@server/models/account";
import { Organisation } from "@server/models/organisation";
import type { Actor } from "@server/policies/actor";
import { presentSession } from "@server/presenters/session-presenter";
import type { Session } from "@shared/contracts/people";

/** The session answer of somebody who is signed in, read fresh. */
export async function sessionOf(actor: Actor, { config }: PublicContext): Promise<Session> {
  const [account, organisation] = await Promise.all([
    Account.findByPk(actor.accountId),
    Organisation.findByPk(actor.organisationId),
  ]);
  if (account === null || organisation === null) throw new NotSignedIn();
  return presentSession({ account, organisation, actor }, config);
}
