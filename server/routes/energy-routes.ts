import {
  downloadIntervals,
  downloadReadings,
  getDayMarks,
  getEnergy,
  getPointSummary,
  getReadings,
  getSeries,
} from "@shared/contracts/energy";
import { instantText } from "@server/database/conversions";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { Invalid } from "@server/http/errors";
import { may } from "@server/policies/policy";
import {
  presentBasis,
  presentColumns,
  presentTotals,
  roundedOrNull,
} from "@server/presenters/present-energy";
import { combineTotals } from "@server/queries/energy/combine-totals";
import { intervalsCsv, readingsCsv } from "@server/queries/energy/csv-files";
import { dayMarks } from "@server/queries/energy/day-marks";
import { loadEnergyPoint } from "@server/queries/energy/energy-point";
import { expectedSeconds, readRange } from "@server/queries/energy/energy-range";
import { energyRows, rangeTotals } from "@server/queries/energy/energy-rows";
import { pointSummary } from "@server/queries/energy/point-summary";
import { readingsPage } from "@server/queries/energy/readings-page";
import { filledTotals } from "@server/readings/energy-fills";
import { chartSeries } from "@server/queries/energy/series";
import { loadRangePlusMinus } from "@server/queries/workings/range-plus-minus";

const policy = may("seeEnergy");
const atOrNull = (ms: number | null) => (ms === null ? null : instantText(new Date(ms)));

/** Energy and readings of one metering point, to look at and to take away. */
export const energyRoutes: readonly Endpoint[] = [
  defineEndpoint(getEnergy, {
    policy,
    async handle(context, { params, query }) {
      const { database, clock } = context;
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const { zone } = energyPoint.site;
      const range = readRange(query, zone);
      const at = { pointId: params.pointId, zone };
      const rows =
        query.step === "total" ? null : await energyRows(database, at, range, query.step);
      const totals = rows
        ? combineTotals(rows.map((row) => row.totals))
        : await rangeTotals(database, params.pointId, range);
      const expectedS = expectedSeconds(range, clock.now());
      const [filled, plusMinus] = await Promise.all([
        filledTotals(database, params.pointId, range),
        rows ? null : loadRangePlusMinus(context, energyPoint, range),
      ]);
      return {
        zone,
        from: instantText(new Date(range.startMs)),
        to: instantText(new Date(range.endMs)),
        basis: presentBasis(energyPoint),
        totals: presentTotals(totals, expectedS, null, filled),
        plusMinus,
        columns: rows && presentColumns(rows),
      };
    },
  }),
  defineEndpoint(getPointSummary, {
    policy,
    async handle(context, { params, query }) {
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const range = readRange(query, energyPoint.site.zone);
      return pointSummary(context, energyPoint, range, context.clock.now());
    },
  }),
  defineEndpoint(getSeries, {
    policy,
    async handle(context, { params, query }) {
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const range = readRange(query, energyPoint.site.zone);
      return chartSeries(context.database, energyPoint, range, query.pixels, context.clock.now());
    },
  }),
  defineEndpoint(getReadings, {
    policy,
    async handle(context, { params, query }) {
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const { zone } = energyPoint.site;
      const range = readRange(query, zone);
      const startMs = startOfPage(query.cursor, range.startMs);
      const page = await readingsPage(
        context.database,
        energyPoint,
        { startMs, endMs: range.endMs },
        query.limit,
      );
      return {
        zone,
        items: page.rows.map((row) => ({
          at: instantText(new Date(row.atMs)),
          flowM3PerHour: roundedOrNull(row.flowM3PerHour, 6),
          supplyC: roundedOrNull(row.supplyC, 6),
          returnC: roundedOrNull(row.returnC, 6),
          powerKw: roundedOrNull(row.powerKw, 4),
          quality: row.quality,
        })),
        nextCursor: page.nextMs === null ? null : String(page.nextMs),
      };
    },
  }),
  defineEndpoint(downloadIntervals, {
    policy,
    async handle(context, { params, query }) {
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const range = readRange(query, energyPoint.site.zone);
      return intervalsCsv(context.database, energyPoint, range, query.step);
    },
  }),
  defineEndpoint(downloadReadings, {
    policy,
    async handle(context, { params, query }) {
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const range = readRange(query, energyPoint.site.zone);
      return readingsCsv(context.database, energyPoint, range);
    },
  }),
  defineEndpoint(getDayMarks, {
    policy,
    async handle(context, { params, query }) {
      const energyPoint = await loadEnergyPoint(context, params.pointId);
      const { site, readings } = energyPoint;
      const range = readRange(query, site.zone);
      return {
        zone: site.zone,
        days: await dayMarks(context.database, energyPoint, range),
        firstReadingAt: atOrNull(readings.firstMs),
        lastReadingAt: atOrNull(readings.lastMs),
      };
    },
  }),
];

/** A cursor is the instant of the page's first row; a foreign one must not reach before the range. */
function startOfPage(cursor: string | undefined, startMs: number): number {
  if (cursor === undefined) return startMs;
  const ms = Number(cursor);
  if (!Number.isSafeInteger(ms) || ms < startMs)
    throw new Invalid([
      {
        pointer: "/query/cursor",
        code: "not-a-cursor",
        message: "Use nextCursor of the answer before.",
      },
    ]);
  return ms;
}
