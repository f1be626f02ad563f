import { listCaughtMail } from "@shared/contracts/people";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { NotFound } from "@server/http/errors";
import { listCaughtMail as readCaughtMail } from "@server/mail/mail-fake";
import { may } from "@server/policies/policy";

export const developmentRoutes: readonly Endpoint[] = [
  defineEndpoint(listCaughtMail, {
    policy: may("readCaughtMail"),
    async handle({ config }) {
      // With a real mail server, as production always has, there is nothing to show.
      if (config.mailFakePort === null) throw new NotFound("mail fake");
      return { items: await readCaughtMail(config.dataDir) };
    },
  }),
];
