import type { PointSummary } from "@shared/contracts/energy";
import { totalEnergy } from "@shared/domain/energy/totals";
import { localDateOf, localDaysBetween } from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import { instantText } from "@server/database/conversions";
import {
  presentBasis,
  presentLoad,
  presentTotals,
  rounded,
} from "@server/presenters/present-energy";
import { loadIntervals } from "@server/readings/interval-rows";
import { combineTotals } from "./combine-totals";
import type { EnergyPoint } from "./energy-point";
import { expectedSeconds, type EnergyRange } from "./energy-range";
import { energyRows, type EnergyRow } from "./energy-rows";
import { leftOutRuns, loadQualityRuns, longest, measuredSeconds } from "./left-out";
import {
  busiestHalfHour,
  loadOf,
  loadPowerColumns,
  nightBase,
  nightHours,
  registerOf,
  type PowerColumns,
  type RegisterName,
} from "./loads";

const mostLeftOut = 50;

/** Everything the loop page says about a range of whole local days. */
export async function pointSummary(
  database: Database,
  energyPoint: EnergyPoint,
  range: EnergyRange,
  nowMs: number,
): Promise<PointSummary> {
  const { point, loop, site, readings } = energyPoint;
  const { zone } = site;
  const [rows, columns, runs] = await Promise.all([
    energyRows(database, { pointId: point.id, zone }, range, "day"),
    loadPowerColumns(database, point.id, range),
    loadQualityRuns(database, point.id, range, nowMs),
  ]);
  const basis = presentBasis(energyPoint);
  const summed = combineTotals(rows.map((row) => row.totals));
  // Without energy nothing is stored by the day; the readings still cover their time.
  const totals = basis.blockedBy ? { ...summed, coveredS: measuredSeconds(runs) } : summed;
  const register = registerOf(loop.service, totals);
  const registers = loop.service === "changeover" ? (["heating", "cooling"] as const) : [register];
  const busiest = await busiestLoad(database, energyPoint, columns, registers, rows);
  const night = nightBase(columns, zone, register, rows.length);
  const leftOut = leftOutRuns(runs);
  // Rows due by the step of the log that was running, which may change within the range.
  const expectedRows = leftOut.reduce((sum, run) => sum + run.rows, totals.measuredRows);
  return {
    zone,
    from: instantText(new Date(range.startMs)),
    to: instantText(new Date(range.endMs)),
    basis,
    totals: presentTotals(totals, expectedSeconds(range, nowMs), expectedRows, summed.coveredS),
    days: presentDays(rows, range, zone),
    ...busiest,
    nightBase: night && {
      ...nightHours,
      register,
      powerKw: rounded(night.powerKw, 4),
      coverage: rounded(night.coverage, 4),
    },
    leftOut: longest(leftOut, mostLeftOut).map((run) => ({
      kind:
        run.kind === "excluded" ? "excluded" : run.reason === "noRows" ? "missing" : "noReading",
      from: instantText(new Date(run.startMs)),
      to: instantText(new Date(run.endMs)),
      rows: run.rows,
      reason: run.reason ?? "noRows",
    })),
    leftOutCount: leftOut.length,
    firstReadingAt: at(readings.firstMs),
    lastReadingAt: at(readings.lastMs),
  };
}

const at = (ms: number | null) => (ms === null ? null : instantText(new Date(ms)));

async function busiestLoad(
  database: Database,
  { point, site }: EnergyPoint,
  columns: PowerColumns,
  registers: readonly RegisterName[],
  days: readonly EnergyRow[],
): Promise<Pick<PointSummary, "busiest" | "busiestDay">> {
  const window = busiestHalfHour(columns, site.zone, registers);
  if (window === null) return { busiest: null, busiestDay: null };
  const totals = totalEnergy(
    await loadIntervals(database, point.id, window.startMs, window.endMs),
    window,
  );
  const load = loadOf(window, totals, window.register);
  const day = days.find((row) => row.startMs <= window.startMs && window.startMs < row.endMs);
  return {
    busiest: load && presentLoad(load),
    busiestDay: day
      ? {
          date: localDateOf(day.startMs, site.zone),
          energyKwh: rounded(day.totals[window.register].energyKwh, 4),
        }
      : null,
  };
}

function presentDays(
  rows: readonly EnergyRow[],
  range: EnergyRange,
  zone: string,
): PointSummary["days"] {
  const dates = localDaysBetween(range, zone);
  return rows.map(({ startMs, endMs, totals }, index) => {
    const covered = (value: number) => (totals.coveredS > 0 ? rounded(value, 4) : null);
    return {
      date: dates[index]?.date ?? localDateOf(startMs, zone),
      heatingKwh: covered(totals.heating.energyKwh),
      coolingKwh: covered(totals.cooling.energyKwh),
      volumeM3: covered(totals.volumeM3),
      coveredS: rounded(totals.coveredS, 3),
      lengthS: (endMs - startMs) / 1000,
    };
  });
}
