import { getSession, signIn, signOut, signOutEverywhere } from "@shared/contracts/people";
import { recordAudit } from "@server/commands/record-audit";
import { signInWithPassword } from "@server/commands/sign-in";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { everyone, may, signedIn } from "@server/policies/policy";
import { sessionOf } from "@server/queries/session-of";
import { takeSessionCookie } from "@server/security/session-cookie";
import { endSessions } from "@server/security/sessions";

export const sessionRoutes: readonly Endpoint[] = [
  defineEndpoint(signIn, {
    policy: everyone,
    limit: { perAddress: 50, minutes: 15, onlyFailures: true },
    async handle(context, { body }) {
      return sessionOf(await signInWithPassword(context, body), context);
    },
  }),
  defineEndpoint(getSession, {
    policy: signedIn,
    handle: (context) => sessionOf(context.actor, context),
  }),
  // Also for somebody whose session has ended meanwhile: the cookie goes in any case.
  defineEndpoint(signOut, {
    policy: everyone,
    async handle(context) {
      const { actor, clock, config, response } = context;
      if (actor?.sessionId) {
        await endSessions({ id: actor.sessionId }, clock.date());
        await recordAudit(context, { kind: "signed-out" });
      }
      takeSessionCookie(response, config);
      return {};
    },
  }),
  defineEndpoint(signOutEverywhere, {
    policy: may("changeOwnAccount"),
    async handle(context) {
      const { actor, clock, config, response } = context;
      const sessions = await endSessions({ accountId: actor.accountId }, clock.date());
      await recordAudit(context, { kind: "signed-out-everywhere", details: { sessions } });
      takeSessionCookie(response, config);
      return {};
    },
  }),
];
