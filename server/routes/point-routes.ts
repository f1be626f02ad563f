import * as contracts from "@shared/contracts/places";
import { removePoint } from "@server/commands/remove-places";
import { createPoint, updatePoint } from "@server/commands/save-point";
import type { Context } from "@server/http/context";
import { defineEndpoint } from "@server/http/define-endpoint";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { may } from "@server/policies/policy";
import { presentPipeTables } from "@server/presenters/present-pipe-tables";
import { presentBoreVersion, presentPoint } from "@server/presenters/present-point";
import { boreHistory, currentBores } from "@server/queries/current-bores";
import { pointHoldings } from "@server/queries/point-holdings";

async function presentAll({ database, scope, actor }: Context, points: readonly MeteringPoint[]) {
  const ids = points.map((point) => point.id);
  const [bores, holdings] = await Promise.all([
    currentBores(scope, ids),
    pointHoldings(database, scope.organisationId, "point", ids),
  ]);
  const holdingOf = new Map(holdings.map((row) => [row.pointId, row]));
  return points.map((point) => {
    const holding = holdingOf.get(point.id);
    const facts = {
      bore: bores.get(point.id) ?? null,
      hasReadings: holding?.hasReadings ?? false,
      holdsFiles: holding !== undefined,
    };
    return presentPoint(point, facts, actor);
  });
}

async function present(context: Context, point: MeteringPoint) {
  const [presented] = await presentAll(context, [point]);
  if (presented === undefined) throw new Error("a presented point went missing");
  return presented;
}

export const pointRoutes = [
  defineEndpoint(contracts.listPoints, {
    policy: may("seeSites"),
    async handle(context, { params, query }) {
      const { id: loopId } = await context.scope.get(Loop, params.loopId, "loop");
      const where = query.archived ? { loopId } : { loopId, archivedAt: null };
      const points = await context.scope.list(MeteringPoint, { where, order: [["id", "ASC"]] });
      return { items: await presentAll(context, points) };
    },
  }),
  defineEndpoint(contracts.createPoint, {
    policy: may("editPoints"),
    status: 201,
    async handle(context, { params, body }) {
      return present(context, await createPoint(context, params.loopId, body));
    },
  }),
  defineEndpoint(contracts.getPoint, {
    policy: may("seeSites"),
    async handle(context, { params }) {
      return present(context, await context.scope.get(MeteringPoint, params.pointId, "point"));
    },
  }),
  defineEndpoint(contracts.updatePoint, {
    policy: may("editPoints"),
    async handle(context, { params, body }) {
      return present(context, await updatePoint(context, params.pointId, body));
    },
  }),
  defineEndpoint(contracts.removePoint, {
    policy: may("editPoints"),
    async handle(context, { params }) {
      await removePoint(context, params.pointId);
      return {};
    },
  }),
  defineEndpoint(contracts.listBoreVersions, {
    policy: may("seeSites"),
    async handle({ scope }, { params }) {
      const { id } = await scope.get(MeteringPoint, params.pointId, "point");
      return { items: (await boreHistory(scope, id)).map(presentBoreVersion) };
    },
  }),
  defineEndpoint(contracts.listPipeTables, {
    policy: may("seeSites"),
    async handle() {
      return presentPipeTables();
    },
  }),
];
