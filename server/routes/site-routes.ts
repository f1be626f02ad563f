import * as contracts from "@shared/contracts/places";
import { createSite, updateSite } from "@server/commands/save-site";
import { removeSite } from "@server/commands/remove-places";
import { instantText } from "@server/database/conversions";
import type { Context } from "@server/http/context";
import { defineEndpoint } from "@server/http/define-endpoint";
import { Invalid } from "@server/http/errors";
import { Building } from "@server/models/building";
import { Site } from "@server/models/site";
import { can } from "@server/policies/can";
import { may } from "@server/policies/policy";
import { presentBuilding } from "@server/presenters/present-building";
import { presentSite } from "@server/presenters/present-site";
import { buildingsHoldingLoops } from "@server/queries/buildings-holding-loops";
import { listSitesPage } from "@server/queries/list-sites";
import { siteFacts } from "@server/queries/site-facts";
import { siteOverview } from "@server/queries/site-overview";

async function present({ database, scope, actor }: Context, site: Site) {
  const factsOf = await siteFacts(database, scope.organisationId, [site.id]);
  return presentSite(site, factsOf(site.id), actor);
}

const instantOrNull = (ms: number | null) => (ms === null ? null : instantText(new Date(ms)));

export const siteRoutes = [
  defineEndpoint(contracts.listSites, {
    policy: may("seeSites"),
    async handle({ database, scope, actor }, { query }) {
      const { sites, nextCursor } = await listSitesPage(scope, query);
      const ids = sites.map((site) => site.id);
      const factsOf = await siteFacts(database, scope.organisationId, ids);
      const items = sites.map((site) => presentSite(site, factsOf(site.id), actor));
      return { items, nextCursor, can: { create: can(actor).editSites } };
    },
  }),
  defineEndpoint(contracts.createSite, {
    policy: may("editSites"),
    status: 201,
    async handle(context, { body }) {
      return present(context, await createSite(context, body));
    },
  }),
  defineEndpoint(contracts.getSite, {
    policy: may("seeSites"),
    async handle(context, { params }) {
      return present(context, await context.scope.get(Site, params.siteId, "site"));
    },
  }),
  defineEndpoint(contracts.updateSite, {
    policy: may("editSites"),
    async handle(context, { params, body }) {
      return present(context, await updateSite(context, params.siteId, body));
    },
  }),
  defineEndpoint(contracts.removeSite, {
    policy: may("editSites"),
    async handle(context, { params }) {
      await removeSite(context, params.siteId);
      return {};
    },
  }),
  defineEndpoint(contracts.getSiteOverview, {
    policy: may("seeSites"),
    async handle(context, { params, query }) {
      const { database, scope, actor, clock } = context;
      const site = await scope.get(Site, params.siteId, "site");
      if (query.to <= query.from)
        throw new Invalid([
          { pointer: "/query/to", code: "empty-range", message: "Must be after the first day." },
        ]);
      const overview = await siteOverview(database, scope, site, query, clock.now());
      const holdsLoops = await buildingsHoldingLoops(scope, overview.buildings);
      return {
        site: await present(context, site),
        buildings: overview.buildings.map((building: Building) =>
          presentBuilding(building, { holdsLoops: holdsLoops.has(building.id) }, actor),
        ),
        loops: [...overview.loops],
        firstReadingAt: instantOrNull(overview.firstReadingMs),
        lastReadingAt: instantOrNull(overview.lastReadingMs),
      };
    },
  }),
];
