import type { EnergySteps } from "../energy/demand";
import type { Interval } from "../time/interval";
import { stepPowerKw, type LoadSteps } from "./load-steps";
import { isOccupied, isWorkingDay, type OccupiedHours } from "./occupied-hours";

/**
 * What a loop draws when nobody asks for much: the 5th percentile of power.
 *
 * Taken over all steps, or over those that start in unoccupied hours, and it says which. A step
 * counts where readings cover at least half of it. Percentile by linear interpolation between order
 * statistics, rank 1 + (n − 1)·p (method 7 of R. J. Hyndman and Y. Fan, "Sample quantiles in
 * statistical packages", The American Statistician 50, 1996).
 *
 * Example: 10, 20, 30, 40 and 50 kW: rank 1.2, 12 kW.
 */
export interface BaseLoad {
  readonly powerKw: number;
  readonly hours: "all" | "unoccupied";
  /** Steps it is taken over. */
  readonly steps: number;
  /** The one or two steps whose powers it lies between, in order of time: its ± is theirs. */
  readonly between: readonly Interval[];
}

export const BASE_LOAD_PERCENTILE = 0.05;
/** Less than this share of a step says little about its mean. */
const LEAST_COVERED = 0.5;

/** `toLocal` turns UTC ms into wall-clock ms. Null where no step counts. */
export function baseLoad(
  steps: EnergySteps,
  hours: "all" | "unoccupied",
  occupied: OccupiedHours,
  toLocal: (utcMs: number) => number,
): BaseLoad | null {
  const leastS = (steps.stepMs / 1000) * LEAST_COVERED;
  const counted: { readonly startMs: number; readonly powerKw: number }[] = [];
  for (let i = 0; i < steps.startMs.length; i++) {
    if (steps.coveredS[i]! < leastS) continue;
    if (hours === "unoccupied" && isOccupied(toLocal(steps.startMs[i]!), occupied)) continue;
    counted.push({ startMs: steps.startMs[i]!, powerKw: stepPowerKw(steps, i) });
  }
  const powers = Float64Array.from(counted, (step) => step.powerKw);
  const powerKw = percentile(powers, BASE_LOAD_PERCENTILE);
  if (powerKw === null) return null;
  const rank = (counted.length - 1) * BASE_LOAD_PERCENTILE;
  const between = counted
    .sort((a, b) => a.powerKw - b.powerKw)
    .slice(Math.floor(rank), Math.ceil(rank) + 1)
    .map(({ startMs }) => ({ startMs, endMs: startMs + steps.stepMs }))
    .sort((a, b) => a.startMs - b.startMs);
  return { powerKw, hours, steps: counted.length, between };
}

/** The `share` quantile, 0 to 1, by linear interpolation; null of nothing. */
export function percentile(values: Float64Array, share: number): number | null {
  if (values.length === 0) return null;
  const sorted = values.slice().sort();
  const rank = (sorted.length - 1) * share;
  const below = Math.floor(rank);
  const low = sorted[below]!;
  const high = sorted[Math.min(below + 1, sorted.length - 1)]!;
  return low + (high - low) * (rank - below);
}

/** Energy used while nobody is in, and how days off compare with working days. */
export interface OffHours {
  /** Energy in unoccupied hours ÷ energy in all; null without energy. */
  readonly energyShare: number | null;
  readonly unoccupiedKwh: number;
  /** Mean power of days without occupied hours ÷ that of days with; null where either is unknown. */
  readonly dayOffRatio: number | null;
}

/** Shares of energy by the occupied hours; a step belongs to where it starts. */
export function offHours(
  steps: EnergySteps,
  occupied: OccupiedHours,
  toLocal: (utcMs: number) => number,
): OffHours {
  let all = 0;
  let unoccupied = 0;
  const working = { kwh: 0, seconds: 0 };
  const off = { kwh: 0, seconds: 0 };
  for (let i = 0; i < steps.startMs.length; i++) {
    const localMs = toLocal(steps.startMs[i]!);
    const kwh = steps.energyKwh[i]!;
    all += kwh;
    if (!isOccupied(localMs, occupied)) unoccupied += kwh;
    const day = isWorkingDay(localMs, occupied) ? working : off;
    day.kwh += kwh;
    day.seconds += steps.coveredS[i]!;
  }
  const known = working.seconds > 0 && off.seconds > 0 && working.kwh > 0;
  return {
    energyShare: all > 0 ? unoccupied / all : null,
    unoccupiedKwh: unoccupied,
    dayOffRatio: known ? off.kwh / off.seconds / (working.kwh / working.seconds) : null,
  };
}

/** Covered time with flow whose |Δθ| is below a limit, and its stretches in order. */
export interface LowDeltaT {
  readonly limitK: number;
  readonly seconds: number;
  readonly runs: readonly Interval[];
}

/**
 * Time the pump ran for hardly any temperature difference: steps with a mean flow above
 * `stillM3PerHour` and |θ_supply − θ_return| below `limitK`. Null where nothing is covered.
 */
export function lowDeltaT(
  steps: LoadSteps,
  limitK: number,
  stillM3PerHour: number,
): LowDeltaT | null {
  const runs: { startMs: number; endMs: number }[] = [];
  let covered = 0;
  let seconds = 0;
  for (let i = 0; i < steps.startMs.length; i++) {
    const coveredS = steps.coveredS[i]!;
    covered += coveredS;
    if (coveredS === 0) continue;
    const flow = steps.volumeM3[i]! / (coveredS / 3600);
    const deltaTK = Math.abs(steps.supplyC[i]! - steps.returnC[i]!);
    if (!(flow > stillM3PerHour && deltaTK < limitK)) continue;
    seconds += coveredS;
    const startMs = steps.startMs[i]!;
    const last = runs.at(-1);
    if (last && last.endMs === startMs) last.endMs = startMs + steps.stepMs;
    else runs.push({ startMs, endMs: startMs + steps.stepMs });
  }
  return covered > 0 ? { limitK, seconds, runs } : null;
}
