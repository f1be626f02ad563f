import * as contracts from "@shared/contracts/places";
import { removeLoop } from "@server/commands/remove-places";
import { createLoop, updateLoop } from "@server/commands/save-loop";
import type { Context } from "@server/http/context";
import { defineEndpoint } from "@server/http/define-endpoint";
import { Loop } from "@server/models/loop";
import { Site } from "@server/models/site";
import { may } from "@server/policies/policy";
import { presentLoop } from "@server/presenters/present-loop";
import { pointHoldings } from "@server/queries/point-holdings";

async function presentAll({ database, scope, actor }: Context, loops: readonly Loop[]) {
  const ids = loops.map((loop) => loop.id);
  const holdings = await pointHoldings(database, scope.organisationId, "loop", ids);
  const holding = new Set(holdings.map((row) => row.loopId));
  const reading = new Set(holdings.filter((row) => row.hasReadings).map((row) => row.loopId));
  return loops.map((loop) =>
    presentLoop(
      loop,
      { hasReadings: reading.has(loop.id), holdsFiles: holding.has(loop.id) },
      actor,
    ),
  );
}

async function present(context: Context, loop: Loop) {
  const [presented] = await presentAll(context, [loop]);
  if (presented === undefined) throw new Error("a presented loop went missing");
  return presented;
}

export const loopRoutes = [
  defineEndpoint(contracts.listLoops, {
    policy: may("seeSites"),
    async handle(context, { params, query }) {
      const { id: siteId } = await context.scope.get(Site, params.siteId, "site");
      const where = query.archived ? { siteId } : { siteId, archivedAt: null };
      const loops = await context.scope.list(Loop, { where, order: [["tag", "ASC"]] });
      return { items: await presentAll(context, loops) };
    },
  }),
  defineEndpoint(contracts.createLoop, {
    policy: may("editSites"),
    status: 201,
    async handle(context, { params, body }) {
      return present(context, await createLoop(context, params.siteId, body));
    },
  }),
  defineEndpoint(contracts.getLoop, {
    policy: may("seeSites"),
    async handle(context, { params }) {
      return present(context, await context.scope.get(Loop, params.loopId, "loop"));
    },
  }),
  defineEndpoint(contracts.updateLoop, {
    policy: may("editSites"),
    async handle(context, { params, body }) {
      return present(context, await updateLoop(context, params.loopId, body));
    },
  }),
  defineEndpoint(contracts.removeLoop, {
    policy: may("editSites"),
    async handle(context, { params }) {
      await removeLoop(context, params.loopId);
      return {};
    },
  }),
];
