import { INTERVAL_MS, type IntervalEnergyColumns } from "@shared/domain/energy/interval-energy";
import { totalEnergy, type EnergyTotals } from "@shared/domain/energy/totals";
import type { Interval } from "@shared/domain/time/interval";
import {
  localDaysBetween,
  localHoursBetween,
  type LocalDay,
} from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import { Invalid } from "@server/http/errors";
import { loadDays } from "@server/readings/day-rows";
import { loadIntervals } from "@server/readings/interval-rows";
import { loadIntervalSums, type Steps } from "@server/readings/interval-sums";
import { combineTotals } from "./combine-totals";
import { requireQuarterHours, type EnergyRange } from "./energy-range";

export type EnergyStep = "quarterHour" | "hour" | "day";

/** One row of energy; a stretch without readings is a row too, with nothing covered. */
export interface EnergyRow extends Interval {
  readonly totals: EnergyTotals;
}

export const noEnergy: EnergyTotals = combineTotals([]);

/** A year of quarter-hours and some; more belongs into a download. */
const mostRows = 40_000;

/**
 * Every step of the range in order. Days and hours are the site's own, so a day is 23 or 25 hours
 * long when clocks change; one that the range cuts is as long as what is left of it.
 * @throws Invalid (422) where the range cuts a quarter-hour or asks for more than 40,000 rows.
 */
export async function energyRows(
  database: Database,
  { pointId, zone }: { pointId: string; zone: string },
  range: EnergyRange,
  step: EnergyStep,
): Promise<EnergyRow[]> {
  if (step === "day" && range.dates) {
    const stored = await loadDays(database, pointId, range.dates.from, range.dates.to);
    const byDate = new Map(stored.map((day) => [day.date, day.totals]));
    return localDaysBetween(range, zone).map(({ date, startMs, endMs }: LocalDay) => ({
      startMs,
      endMs,
      totals: byDate.get(date) ?? noEnergy,
    }));
  }
  requireQuarterHours(range);
  const periods = periodsOf(range, zone, step);
  if (step === "quarterHour")
    return rowsOf(await loadIntervals(database, pointId, range.startMs, range.endMs), periods);
  const rows: EnergyRow[] = [];
  const runs = equalSteps(periods);
  for (let from = 0; from < runs.length; from += sideBySide) {
    const asked = runs.slice(from, from + sideBySide);
    const found = await Promise.all(
      asked.map(({ steps }) => loadIntervalSums(database, pointId, steps)),
    );
    asked.forEach((run, i) => rows.push(...rowsOf(found[i] as IntervalEnergyColumns, run.periods)));
  }
  return rows;
}

function rowsOf(columns: IntervalEnergyColumns, periods: readonly Interval[]): EnergyRow[] {
  return periods.map(({ startMs, endMs }) => ({
    startMs,
    endMs,
    totals: totalEnergy(columns, { startMs, endMs }),
  }));
}

/** Queries of one answer at a time: others need connections too. */
const sideBySide = 2;
/** Half a year of hours, so that two cores of the database share a year. */
const mostSteps = 4_400;

/**
 * Periods that follow each other, as runs of one length: a year of hours is one, but for a range
 * that cuts an hour or a zone that moves its clocks by half of one.
 */
function equalSteps(periods: readonly Interval[]): { steps: Steps; periods: Interval[] }[] {
  const runs: { steps: Steps; periods: Interval[] }[] = [];
  let from = 0;
  for (let to = 1; to <= periods.length; to++) {
    const { startMs, endMs } = periods[from] as Interval;
    const stepMs = endMs - startMs;
    const next = periods[to];
    if (next && next.endMs - next.startMs === stepMs && to - from < mostSteps) continue;
    const count = to - from;
    runs.push({ steps: { startMs, stepMs, count }, periods: periods.slice(from, to) });
    from = to;
  }
  return runs;
}

/** The range as one. Whole local days come from the stored days, which is a thousand times less. */
export async function rangeTotals(
  database: Database,
  pointId: string,
  range: EnergyRange,
): Promise<EnergyTotals> {
  if (range.dates) {
    const days = await loadDays(database, pointId, range.dates.from, range.dates.to);
    return combineTotals(days.map((day) => day.totals));
  }
  requireQuarterHours(range);
  return totalEnergy(await loadIntervals(database, pointId, range.startMs, range.endMs));
}

function periodsOf(range: EnergyRange, zone: string, step: EnergyStep): Interval[] {
  const expected = (range.endMs - range.startMs) / (step === "quarterHour" ? INTERVAL_MS : 3.6e6);
  if (step !== "day" && expected > mostRows)
    throw new Invalid(
      [
        {
          pointer: "/query/to",
          code: "too-many-rows",
          message: `This would be ${Math.ceil(expected)} rows; ${mostRows} is the most. Ask for a shorter range, a longer step, or the CSV.`,
        },
      ],
      "The range has too many rows for one answer.",
    );
  if (step === "quarterHour") return quarterHours(range);
  const whole = step === "hour" ? localHoursBetween(range, zone) : localDaysBetween(range, zone);
  return whole.map(({ startMs, endMs }) => ({
    startMs: Math.max(startMs, range.startMs),
    endMs: Math.min(endMs, range.endMs),
  }));
}

function quarterHours({ startMs, endMs }: Interval): Interval[] {
  return Array.from({ length: (endMs - startMs) / INTERVAL_MS }, (_, index) => ({
    startMs: startMs + index * INTERVAL_MS,
    endMs: startMs + (index + 1) * INTERVAL_MS,
  }));
}
