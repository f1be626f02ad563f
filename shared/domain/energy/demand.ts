import { HOUR_MS, MINUTE_MS, type Interval } from "../time/interval";

/**
 * Demand: the greatest mean power over a stretch of a given length.
 *
 * `fixed`: energy in a block of the wall clock ÷ the block's length; blocks start on multiples of
 * their length since local midnight. `rolling`: the greatest mean over any window of that length,
 * which starts on any step. A window that readings do not cover whole never qualifies, because a
 * peak must not come from half-measured time. Of equal windows the first one counts.
 *
 * Source: "maximum demand" of the International Electrotechnical Vocabulary, part 691 (tariffs).
 * Example: quarter-hours of 10, 40, 50 and 10 kW: fixed half hour 30 kW, from the
 * third; rolling half hour 45 kW, from the second.
 */
export interface DemandDefinition {
  readonly kind: "fixed" | "rolling";
  /** A multiple of the step's length; anything else has no demand. */
  readonly windowMinutes: number;
}

/** Energy in equal steps; steps without any reading may be absent. */
export interface EnergySteps {
  readonly stepMs: number;
  /** Start of each step, UTC ms, ascending. */
  readonly startMs: Float64Array;
  /** Seconds of the step that readings cover. */
  readonly coveredS: Float64Array;
  /** Of one register, ≥ 0. */
  readonly energyKwh: Float64Array;
}

export interface PeakDemand extends Interval {
  readonly powerKw: number;
  readonly definition: DemandDefinition;
}

/** Seconds that rounding may take from a fully covered step. */
const ROUNDING_S = 1e-3;
/** A mean that is higher by less than this share is the same mean, summed in another order. */
const SAME = 1e-9;

/**
 * The peak of the steps by one definition; null where no window is covered whole, or where the
 * window is no multiple of the step (an hourly log has no quarter-hour peak).
 *
 * `offsetAt` gives local − UTC in ms and matters for fixed blocks only; UTC where left out.
 */
export function peakDemand(
  steps: EnergySteps,
  definition: DemandDefinition,
  offsetAt: (utcMs: number) => number = () => 0,
): PeakDemand | null {
  const { startMs, coveredS, energyKwh, stepMs } = steps;
  const windowMs = definition.windowMinutes * MINUTE_MS;
  const count = windowMs / stepMs;
  if (!Number.isInteger(count) || count < 1) return null;
  const fullS = stepMs / 1000 - ROUNDING_S;
  let best: PeakDemand | null = null;
  // Full and adjoining steps that end with the current one.
  let run = 0;
  for (let i = 0; i < startMs.length; i++) {
    if (coveredS[i]! < fullS) {
      run = 0;
      continue;
    }
    run = run > 0 && startMs[i] === startMs[i - 1]! + stepMs ? run + 1 : 1;
    if (run < count) continue;
    const from = startMs[i - count + 1]!;
    if (definition.kind === "fixed" && (from + offsetAt(from)) % windowMs !== 0) continue;
    let energy = 0;
    for (let j = i - count + 1; j <= i; j++) energy += energyKwh[j]!;
    const powerKw = energy / (windowMs / HOUR_MS);
    if (best === null || powerKw > best.powerKw * (1 + SAME)) {
      best = { startMs: from, endMs: from + windowMs, powerKw, definition };
    }
  }
  return best;
}
