import { HOUR_MS, type Interval } from "../time/interval";
import { INTERVAL_MS, type IntervalEnergyColumns } from "./interval-energy";

/**
 * The busiest stretch of a given length: the greatest mean power over fully covered intervals.
 *
 * A window that readings do not cover whole never qualifies, because a peak must not come from
 * half-measured time. `fixed` windows start on multiples of their length since the zone's midnight
 * (give the zone's offset where that is off the half hour); `rolling` ones on any quarter hour.
 */
export interface PeakOptions {
  readonly register: "heating" | "cooling";
  /** A multiple of 15 minutes; half an hour where left out. */
  readonly windowMs?: number;
  readonly alignment?: "fixed" | "rolling";
  /** Local − UTC in ms, for `fixed`. */
  readonly offsetMs?: number;
  /** Looks only within. */
  readonly within?: Interval;
}

export interface PeakWindow extends Interval {
  readonly powerKw: number;
}

/** Seconds that rounding may take from a fully covered interval. */
const FULL = INTERVAL_MS / 1000 - 1e-3;

/** Null where no window is covered whole, or where the register did nothing in any of them. */
export function peakWindow(
  columns: IntervalEnergyColumns,
  options: PeakOptions,
): PeakWindow | null {
  const windowMs = options.windowMs ?? 2 * INTERVAL_MS;
  const intervals = windowMs / INTERVAL_MS;
  if (!Number.isInteger(intervals) || intervals < 1) {
    throw new RangeError(`A window is a multiple of ${INTERVAL_MS} ms, not ${windowMs} ms.`);
  }
  const { startMs, coveredS } = columns;
  const { energyKwh } = columns[options.register];
  let best: PeakWindow | null = null;
  // Full and adjoining intervals that end with the current one.
  let run = 0;
  for (let i = 0; i < startMs.length; i++) {
    if (coveredS[i]! < FULL) {
      run = 0;
      continue;
    }
    run = run > 0 && startMs[i] === startMs[i - 1]! + INTERVAL_MS ? run + 1 : 1;
    if (run < intervals) continue;
    const from = startMs[i - intervals + 1]!;
    const to = from + windowMs;
    if (options.within && (from < options.within.startMs || to > options.within.endMs)) continue;
    if (options.alignment !== "rolling" && (from + (options.offsetMs ?? 0)) % windowMs !== 0) {
      continue;
    }
    let energy = 0;
    for (let j = i - intervals + 1; j <= i; j++) energy += energyKwh[j]!;
    const powerKw = energy / (windowMs / HOUR_MS);
    if (powerKw > (best?.powerKw ?? 0)) best = { startMs: from, endMs: to, powerKw };
  }
  return best;
}
