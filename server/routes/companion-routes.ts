import { getCompanionSeries, listCompanions } from "@shared/contracts/companions";
import { instantText } from "@server/database/conversions";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { may } from "@server/policies/policy";
import { presentCompanionSeries } from "@server/presenters/present-companions";
import { loadEnergyPoint } from "@server/queries/energy/energy-point";
import { readRange } from "@server/queries/energy/energy-range";
import { companionSpans, loadCompanions } from "@server/readings/load-companions";

const policy = may("seeEnergy");

/** Outdoor temperature, electric power and pressure of one metering point. */
export const companionRoutes: readonly Endpoint[] = [
  defineEndpoint(listCompanions, {
    policy,
    async handle(context, { params }) {
      const { point, site } = await loadEnergyPoint(context, params.pointId);
      const spans = await companionSpans(context.database, point.id);
      return {
        zone: site.zone,
        items: spans.map(({ firstMs, lastMs, ...span }) => ({
          ...span,
          firstAt: instantText(new Date(firstMs)),
          lastAt: instantText(new Date(lastMs)),
        })),
      };
    },
  }),
  defineEndpoint(getCompanionSeries, {
    policy,
    async handle(context, { params, query }) {
      const { point, site } = await loadEnergyPoint(context, params.pointId);
      const range = readRange(query, site.zone);
      const { channel } = params;
      const found = await loadCompanions(context.database, point.id, [channel], range);
      return presentCompanionSeries(site.zone, range, found[channel] ?? null, query.pixels);
    },
  }),
];
