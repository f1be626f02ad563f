import {
  downloadDurationCurve,
  getLoopPump,
  getPointShape,
  removeLoopPump,
  saveLoopPump,
} from "@shared/contracts/shape";
import { removePump, savePump } from "@server/commands/save-pump";
import type { Context } from "@server/http/context";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { Loop } from "@server/models/loop";
import { LoopPump } from "@server/models/loop-pump";
import { Site } from "@server/models/site";
import { may } from "@server/policies/policy";
import { presentPump } from "@server/presenters/present-pump";
import { presentShape } from "@server/presenters/present-shape";
import { loadEnergyPoint } from "@server/queries/energy/energy-point";
import { expectedSeconds, readRange } from "@server/queries/energy/energy-range";
import { durationCsv } from "@server/queries/shape/duration-csv";
import { loadShape, rangeLoad } from "@server/queries/shape/load-shape";
import { shapePlusMinus } from "@server/queries/shape/shape-plus-minus";

async function siteOfLoop({ scope }: Context, loopId: string): Promise<Site> {
  const { siteId } = await scope.get(Loop, loopId, "loop");
  return scope.get(Site, siteId, "site");
}

/** The shape of a point's load, and the pump a loop's excess flow is priced with. */
export const shapeRoutes: readonly Endpoint[] = [
  defineEndpoint(getPointShape, {
    policy: may("seeEnergy"),
    async handle(context, { params, query }) {
      const { database, scope, clock } = context;
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const range = readRange(query, energyPoint.site.zone);
      const load = await rangeLoad(database, energyPoint, range);
      const pump = await scope.find(LoopPump, { where: { loopId: energyPoint.loop.id } });
      const windowMinutes = Number(query.windowMinutes);
      const shape = loadShape(energyPoint, load, pump, {
        windowMinutes,
        hours: query.hours,
        minimumFlowM3PerHour: query.qMin ?? null,
        lowDeltaTK: query.lowDeltaTK ?? null,
      });
      const expectedS = expectedSeconds(range, clock.now());
      const plusMinus = await shapePlusMinus(context, energyPoint, range, load, shape);
      return presentShape(energyPoint, range, load, shape, plusMinus, {
        windowMinutes,
        expectedS,
      });
    },
  }),
  defineEndpoint(downloadDurationCurve, {
    policy: may("seeEnergy"),
    async handle(context, { params, query }) {
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const range = readRange(query, energyPoint.site.zone);
      return durationCsv(energyPoint, range, await rangeLoad(context.database, energyPoint, range));
    },
  }),
  defineEndpoint(getLoopPump, {
    policy: may("seeSites"),
    async handle(context, { params: { loopId } }) {
      const site = await siteOfLoop(context, loopId);
      const pump = await context.scope.find(LoopPump, { where: { loopId } });
      return presentPump(pump, site, context.actor);
    },
  }),
  defineEndpoint(saveLoopPump, {
    policy: may("editSites"),
    async handle(context, { params: { loopId }, body }) {
      const pump = await savePump(context, loopId, body);
      return presentPump(pump, await siteOfLoop(context, loopId), context.actor);
    },
  }),
  defineEndpoint(removeLoopPump, {
    policy: may("editSites"),
    async handle(context, { params }) {
      await removePump(context, params.loopId);
      return {};
    },
  }),
];
