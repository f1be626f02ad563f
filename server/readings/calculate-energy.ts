import { integrateEnergy } from "@shared/domain/energy/integrate";
import type { IntervalEnergyColumns } from "@shared/domain/energy/interval-energy";
import { rowsOutsideFluid, type OutsideFluid } from "@shared/domain/energy/fluid-range";
import { GAP_FACTOR } from "@shared/domain/readings/covered-steps";
import { totalEnergy, type EnergyTotals } from "@shared/domain/energy/totals";
import { fluidRows } from "@shared/domain/readings/corrections/fluid-span";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";
import type { LocalDay } from "@shared/domain/time/local-calendar";
import { combineTotals } from "@server/queries/energy/combine-totals";
import { sumDays, type DayEnergy } from "./day-rows";
import { powerOptionsOf, type EnergySettings } from "./energy-settings";
import { stretchesOf } from "./energy-stretches";
import { indexFrom, sliceColumns, trimSegments } from "./load-segments";

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

/** The energy of a span without its quarter-hours, which of ten years fill a hundred megabytes. */
export interface SpanEnergy extends Omit<CalculatedEnergy, "intervals"> {
  readonly totals: EnergyTotals;
}

/**
 * The same as {@link calculateEnergy} `within` a span, worked out stretch by stretch so that memory
 * stays flat; sums may differ in their last bit. `onProgress` is called after each stretch with the
 * share done and may throw to stop the work.
 */
export function calculateSpan(
  segments: readonly ReadingSegment[],
  settings: EnergySettings,
  days: readonly LocalDay[],
  within: Interval,
  onProgress?: (share: number) => void,
): SpanEnergy | null {
  const stepMs = Math.min(...segments.map(({ nominalStepMs }) => nominalStepMs));
  const parts: SpanEnergy[] = [];
  let done = 0;
  for (const stretch of stretchesOf(days, Number.isFinite(stepMs) ? stepMs : 0)) {
    const isFirst = done === 0;
    done += stretch.length;
    // What lies before the first day and after the last is the first's and the last's.
    const startMs = isFirst ? within.startMs : (stretch[0]?.startMs ?? within.startMs);
    const endMs =
      done === days.length ? within.endMs : (stretch[stretch.length - 1]?.endMs ?? within.endMs);
    const rows = trimSegments(segments, startMs, endMs);
    const energy = calculateEnergy(rows, settings, stretch, { startMs, endMs });
    if (energy === null) return null;
    const { intervals, ...part } = energy;
    parts.push({ ...part, totals: totalEnergy(intervals) });
    onProgress?.(done / days.length);
  }
  if (parts.length === 0) return null;
  return {
    totals: combineTotals(parts.map(({ totals }) => totals)),
    days: parts.flatMap((part) => part.days),
    outsideFluidRows: parts.reduce((sum, part) => sum + part.outsideFluidRows, 0),
    outsideFluid: parts.flatMap((part) => part.outsideFluid).slice(0, 20),
  };
}
