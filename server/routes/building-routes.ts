import * as contracts from "@shared/contracts/places";
import { removeBuilding } from "@server/commands/remove-places";
import { createBuilding, updateBuilding } from "@server/commands/save-building";
import type { Context } from "@server/http/context";
import { defineEndpoint } from "@server/http/define-endpoint";
import { Building } from "@server/models/building";
import { Site } from "@server/models/site";
import { may } from "@server/policies/policy";
import { presentBuilding } from "@server/presenters/present-building";
import { buildingsHoldingLoops } from "@server/queries/buildings-holding-loops";

async function present({ scope, actor }: Context, building: Building) {
  const holding = await buildingsHoldingLoops(scope, [building]);
  return presentBuilding(building, { holdsLoops: holding.has(building.id) }, actor);
}

export const buildingRoutes = [
  defineEndpoint(contracts.listBuildings, {
    policy: may("seeSites"),
    async handle({ scope, actor }, { params, query }) {
      const { id: siteId } = await scope.get(Site, params.siteId, "site");
      const where = query.archived ? { siteId } : { siteId, archivedAt: null };
      const buildings = await scope.list(Building, { where, order: [["id", "ASC"]] });
      const holding = await buildingsHoldingLoops(scope, buildings);
      const items = buildings.map((building) =>
        presentBuilding(building, { holdsLoops: holding.has(building.id) }, actor),
      );
      return { items };
    },
  }),
  defineEndpoint(contracts.createBuilding, {
    policy: may("editSites"),
    status: 201,
    async handle(context, { params, body }) {
      return present(context, await createBuilding(context, params.siteId, body));
    },
  }),
  defineEndpoint(contracts.updateBuilding, {
    policy: may("editSites"),
    async handle(context, { params, body }) {
      return present(context, await updateBuilding(context, params.buildingId, body));
    },
  }),
  defineEndpoint(contracts.removeBuilding, {
    policy: may("editSites"),
    async handle(context, { params }) {
      await removeBuilding(context, params.buildingId);
      return {};
    },
  }),
];
