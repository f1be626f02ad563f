import { setTimeout as wait } from "node:timers/promises";
import {
  changePassword,
  requestPasswordReset,
  resetPassword,
  updateAccount,
} from "@shared/contracts/people";
import { changeOwnPassword, resetForgottenPassword } from "@server/commands/change-password";
import { requestReset } from "@server/commands/request-password-reset";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { Account } from "@server/models/account";
import { everyone, may } from "@server/policies/policy";
import { sessionOf } from "@server/queries/session-of";

/** Long enough to cover the work for a known address, so that time does not tell it is known. */
const resetAnswerMs = 300;

export const accountRoutes: readonly Endpoint[] = [
  defineEndpoint(updateAccount, {
    policy: may("changeOwnAccount"),
    async handle(context, { body }) {
      await Account.update(body, { where: { id: context.actor.accountId } });
      return sessionOf(context.actor, context);
    },
  }),
  defineEndpoint(changePassword, {
    policy: may("changeOwnAccount"),
    async handle(context, { body }) {
      await changeOwnPassword(context, body);
      return {};
    },
  }),
  defineEndpoint(requestPasswordReset, {
    policy: everyone,
    limit: { perAddress: 20, minutes: 15 },
    async handle(context, { body }) {
      await Promise.all([requestReset(context, body.email), wait(resetAnswerMs)]);
      return {};
    },
  }),
  defineEndpoint(resetPassword, {
    policy: everyone,
    limit: { perAddress: 20, minutes: 15, onlyFailures: true },
    async handle(context, { body }) {
      await resetForgottenPassword(context, body);
      return {};
    },
  }),
];
