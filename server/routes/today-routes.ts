import { getToday } from "@shared/contracts/energy";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { Site } from "@server/models/site";
import { may } from "@server/policies/policy";
import { siteToday } from "@server/queries/today/site-today";

/** The page everybody but a tenant contact starts on. */
export const todayRoutes: readonly Endpoint[] = [
  defineEndpoint(getToday, {
    policy: may("seeEnergy"),
    async handle(context, { params }) {
      const site = await context.scope.get(Site, params.siteId, "site");
      return siteToday(context, site, context.clock.now());
    },
  }),
];
