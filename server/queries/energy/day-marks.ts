import { coverage } from "@shared/domain/readings/coverage";
import { RowQuality } from "@shared/domain/readings/reading-columns";
import { overlap } from "@shared/domain/time/interval";
import { localDateOf, localDaysBetween, type LocalDay } from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import { filledStretches, type FilledStretch } from "@server/readings/energy-fills";
import { loadDays } from "@server/readings/day-rows";
import { loadSegments } from "@server/readings/load-segments";
import type { EnergyPoint } from "./energy-point";
import type { EnergyRange } from "./energy-range";

export interface DayMark {
  readonly date: string;
  /** `none` where the point has no readings yet or any more; `missing` where some are lacking. */
  readonly kind: "measured" | "filled" | "excluded" | "missing" | "none";
  readonly coverage: number;
}

/** A day with less than five minutes lost is whole for the eye; its totals still say so. */
const wholeDay = 0.9965;

/** One mark a local day of the range. Where there is no energy, the readings themselves are asked. */
export async function dayMarks(
  database: Database,
  energyPoint: EnergyPoint,
  range: EnergyRange,
): Promise<DayMark[]> {
  const { point, site, settings, readings } = energyPoint;
  const days = localDaysBetween(range, site.zone);
  const { firstMs, lastMs } = readings;
  if (firstMs === null || lastMs === null || range.dates === null)
    return days.map(({ date }) => ({ date, kind: "none", coverage: 0 }));
  const stored = settings.fluid.ok
    ? new Map(
        (await loadDays(database, point.id, range.dates.from, range.dates.to)).map((day) => [
          day.date,
          { coveredS: day.totals.coveredS, excluded: day.totals.excludedRows },
        ]),
      )
    : await fromReadings(database, energyPoint, days);
  const stretches = await filledStretches(database, point.id, range);
  const firstDate = localDateOf(firstMs, site.zone);
  const lastDate = localDateOf(lastMs, site.zone);
  const stepS = (readings.nominalStepMs ?? 0) / 1000;
  return days.map((day): DayMark => {
    const { date } = day;
    const found = stored.get(date);
    if (isFilled(day, found?.coveredS ?? 0, stretches))
      return {
        date,
        kind: "filled",
        coverage: (found?.coveredS ?? 0) / ((day.endMs - day.startMs) / 1000),
      };
    if (!found) {
      const within = date >= firstDate && date <= lastDate;
      return { date, kind: within ? "missing" : "none", coverage: 0 };
    }
    const lengthS = (day.endMs - day.startMs) / 1000;
    const covered = Math.min(1, found.coveredS / lengthS);
    if (covered >= wholeDay) return { date, kind: "measured", coverage: covered };
    const mostlyExcluded = found.excluded * stepS * 2 >= lengthS - found.coveredS;
    const excluded = found.excluded > 0 && mostlyExcluded;
    return { date, kind: excluded ? "excluded" : "missing", coverage: covered };
  });
}

/** Whether fills stand for what readings lack of a day, which lacks something. */
function isFilled(day: LocalDay, coveredS: number, stretches: readonly FilledStretch[]): boolean {
  const lengthS = (day.endMs - day.startMs) / 1000;
  if (coveredS >= wholeDay * lengthS) return false;
  const filledS = stretches.reduce((sum, stretch) => {
    const shared = overlap(stretch, day);
    if (!shared) return sum;
    const share = (shared.endMs - shared.startMs) / (stretch.endMs - stretch.startMs);
    return sum + stretch.filledS * share;
  }, 0);
  return coveredS + filledS >= wholeDay * lengthS;
}

async function fromReadings(
  database: Database,
  { point }: EnergyPoint,
  days: readonly LocalDay[],
): Promise<Map<string, { coveredS: number; excluded: number }>> {
  const found = new Map<string, { coveredS: number; excluded: number }>();
  for (const day of days) {
    const segments = await loadSegments(database, point.id, day.startMs, day.endMs);
    let rows = 0;
    let excluded = 0;
    for (const { columns } of segments) {
      columns.instantMs.forEach((at, row) => {
        if (at < day.startMs || at >= day.endMs) return;
        rows++;
        if (columns.quality[row] === RowQuality.excluded) excluded++;
      });
    }
    if (rows > 0)
      found.set(day.date, { coveredS: coverage(segments, day).coveredMs / 1000, excluded });
  }
  return found;
}
