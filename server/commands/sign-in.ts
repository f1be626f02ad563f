import type { PublicContext } from "@server/http/context";
import { HttpProblem } from "@server/http/errors";
import { Account } from "@server/models/account";
import { Membership } from "@server/models/membership";
import type { Actor } from "@server/policies/actor";
import { demoAccountsAllowed } from "@server/security/demo-accounts-allowed";
import { giveSessionCookie } from "@server/security/session-cookie";
import { endSessions, startSession } from "@server/security/sessions";
import { clearSignInFailures, takeSignInAttempt } from "@server/security/sign-in-limit";
import { recordAudit } from "./record-audit";

/** The one refusal for a wrong address, a wrong password and an account that was shut. */
function refused(): HttpProblem {
  return new HttpProblem({
    status: 401,
    code: "wrong-credentials",
    title: "Sign-in failed",
    detail: "This e-mail address and password do not fit together.",
    remedy: "Check both, or ask for a new password.",
  });
}

/**
 * Signs in with address and password: starts a session and sets its cookie.
 * @throws HttpProblem wrong-credentials (401), RateLimited (429).
 */
export async function signInWithPassword(
  context: PublicContext,
  { email, password }: { email: string; password: string },
): Promise<Actor> {
  const { services, clock, config } = context;
  await takeSignInAttempt(email, services);
  const account = await Account.findOne({ where: { email } });
  const fits = await services.passwords.matches(password, account?.passwordHash ?? null);
  const isShut = account?.isDemo === true && !demoAccountsAllowed(config);
  const membership =
    account && fits && !isShut
      ? await Membership.findOne({
          where: { accountId: account.id, state: "active" },
          order: [["id", "ASC"]],
        })
      : null;
  if (account === null || membership === null) {
    const by = { accountId: account?.id ?? null, name: email, organisationId: null };
    await recordAudit({ ...context, actor: null }, { kind: "sign-in-refused", by });
    throw refused();
  }
  await clearSignInFailures(email);
  // The browser holds one session: the one it brought along would live on unseen.
  if (context.actor?.sessionId) await endSessions({ id: context.actor.sessionId }, clock.date());
  return enter(context, account, membership);
}

/** Starts a session of a member whose identity is proven, and gives the browser its cookie. */
export async function enter(
  context: PublicContext,
  account: Account,
  membership: Membership,
): Promise<Actor> {
  const { clock, config, request, response } = context;
  const session = await startSession(
    {
      membershipId: membership.id,
      accountId: account.id,
      organisationId: membership.organisationId,
    },
    request,
    clock.date(),
  );
  await membership.update({ lastSeenAt: clock.date() });
  const actor: Actor = {
    accountId: account.id,
    accountName: account.name,
    organisationId: membership.organisationId,
    membershipId: membership.id,
    role: membership.role,
    via: "session",
    sessionId: session.id,
  };
  await recordAudit({ ...context, actor }, { kind: "signed-in" });
  giveSessionCookie(response, config, session);
  return actor;
}
