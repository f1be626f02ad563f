import * as contracts from "@shared/contracts/meter-comparisons";
import {
  saveMeterComparison,
  withdrawMeterComparison,
} from "@server/commands/save-meter-comparison";
import type { Context } from "@server/http/context";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { MeterComparison } from "@server/models/meter-comparison";
import { Site } from "@server/models/site";
import { can } from "@server/policies/can";
import { may } from "@server/policies/policy";
import { meterComparisonCsv } from "@server/presenters/meter-comparison-csv";
import {
  presentMeterComparison,
  presentMeterComparisonLine,
} from "@server/presenters/present-meter-comparison";
import { comparisonSurroundings } from "@server/queries/comparisons/comparison-surroundings";
import { meterComparisonPage } from "@server/queries/comparisons/meter-comparison-page";
import { workOutComparison } from "@server/queries/comparisons/work-out-comparison";

async function present(context: Context, row: MeterComparison) {
  const [site, around] = await Promise.all([
    context.scope.get(Site, row.siteId, "site"),
    comparisonSurroundings(context, row),
  ]);
  return presentMeterComparison(row, site, around, context.actor);
}

function load({ scope }: Context, id: string): Promise<MeterComparison> {
  return scope.get(MeterComparison, id, "comparison");
}

/** Two meters over one period, and energy that stands in for one. */
export const meterComparisonRoutes: readonly Endpoint[] = [
  defineEndpoint(contracts.listMeterComparisons, {
    policy: may("seeComparisons"),
    async handle({ scope, actor }, { query }) {
      const { rows, nextCursor } = await meterComparisonPage(scope, query);
      const ids = [...new Set(rows.map(({ siteId }) => siteId))];
      const sites = new Map(
        (await scope.list(Site, { where: { id: ids } })).map((site) => [site.id, site]),
      );
      return {
        items: rows.flatMap((row) => {
          const site = sites.get(row.siteId);
          return site ? [presentMeterComparisonLine(row, site)] : [];
        }),
        nextCursor,
        can: { create: can(actor).editComparisons },
      };
    },
  }),
  defineEndpoint(contracts.tryMeterComparison, {
    policy: may("seeComparisons"),
    async handle({ database, scope, clock }, { params, body }) {
      const site = await scope.get(Site, params.siteId, "site");
      const surroundings = { database, scope, nowMs: clock.now() };
      return (await workOutComparison(surroundings, site, body)).result;
    },
  }),
  defineEndpoint(contracts.createMeterComparison, {
    policy: may("editComparisons"),
    status: 201,
    async handle(context, { params, body }) {
      return present(context, await saveMeterComparison(context, params.siteId, body));
    },
  }),
  defineEndpoint(contracts.getMeterComparison, {
    policy: may("seeComparisons"),
    async handle(context, { params }) {
      return present(context, await load(context, params.meterComparisonId));
    },
  }),
  defineEndpoint(contracts.withdrawMeterComparison, {
    policy: may("editComparisons"),
    async handle(context, { params, body }) {
      const { meterComparisonId } = params;
      return present(
        context,
        await withdrawMeterComparison(context, meterComparisonId, body.reason),
      );
    },
  }),
  defineEndpoint(contracts.downloadMeterComparison, {
    policy: may("seeComparisons"),
    async handle(context, { params }) {
      const row = await load(context, params.meterComparisonId);
      return meterComparisonCsv(await present(context, row));
    },
  }),
];
