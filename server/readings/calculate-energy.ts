import { integrateEnergy } from "@shared/domain/energy/integrate";
import type { IntervalEnergyColumns } from "@shared/domain/energy/interval-energy";
import { rowsOutsideFluid, type OutsideFluid } from "@shared/domain/energy/fluid-range";
import { GAP_FACTOR } from "@shared/domain/readings/covered-steps";
import { fluidRows } from "@shared/domain/readings/corrections/fluid-span";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";
import type { LocalDay } from "@shared/domain/time/local-calendar";
import { sumDays, type DayEnergy } from "./day-rows";
import { powerOptionsOf, type EnergySettings } from "./energy-settings";
import { indexFrom, sliceColumns } from "./load-segments";

export interface CalculatedEnergy {
  readonly intervals: IntervalEnergyColumns;
  readonly days: DayEnergy[];
  readonly outsideFluidRows: number;
  /** The first few of them. */
  readonly outsideFluid: readonly OutsideFluid[];
}

/**
 * Energy of resolved readings within whole local days, or only `within` a part of them; null where
 * the loop's fluid gives none. The check before an import, the import itself and a recalculation all come through here.
 */
export function calculateEnergy(
  segments: readonly ReadingSegment[],
  settings: EnergySettings,
  days: readonly LocalDay[],
  within?: Interval,
): CalculatedEnergy | null {
  const options = powerOptionsOf(settings);
  const first = days[0];
  const last = days[days.length - 1];
  if (!options || !first || !last) return null;
  const window: Interval = within ?? { startMs: first.startMs, endMs: last.endMs };
  const intervals = integrateEnergy(segments, {
    ...options,
    window,
    gapFactor: GAP_FACTOR[settings.meterPlace.gapRule],
  });
  let outsideFluidRows = 0;
  const outsideFluid: OutsideFluid[] = [];
  const byDay = new Map<string, number>();
  for (const segment of segments) {
    for (const { from, to, fluid } of fluidRows(segment, options.fluid)) {
      const ofFluid = sliceColumns(segment.columns, from, to);
      const rows = sliceColumns(
        ofFluid,
        indexFrom(ofFluid.instantMs, window.startMs),
        indexFrom(ofFluid.instantMs, window.endMs),
      );
      const found = rowsOutsideFluid(rows, fluid);
      if (found.count === 0) continue;
      outsideFluidRows += found.count;
      outsideFluid.push(...found.examples.slice(0, 20 - outsideFluid.length));
      for (const day of days) {
        const first = indexFrom(rows.instantMs, day.startMs);
        const end = indexFrom(rows.instantMs, day.endMs);
        if (first === end) continue;
        const { count } = rowsOutsideFluid(sliceColumns(rows, first, end), fluid, 0);
        if (count > 0) byDay.set(day.date, (byDay.get(day.date) ?? 0) + count);
      }
    }
  }
  return {
    intervals,
    days: sumDays(intervals, days, (day) => byDay.get(day.date) ?? 0),
    outsideFluidRows,
    outsideFluid,
  };
}
