import { COVERAGE_FACTOR } from "./combine-terms";
import { standardFromHalfWidth } from "./distributions";
import {
  expandedFromLimitsPercent,
  meterLimits,
  type MeterLimits,
  type MeterLimitState,
} from "./meter-limits";

/** How well a meter's class lets its figures be known, expanded (k = 2), %. */
export interface MeterClassUncertainty {
  readonly limits: MeterLimits;
  readonly energyPercent: number;
  /** Of the flow part alone: what volume is known to. */
  readonly volumePercent: number;
  /** Of the sensor pair alone: what ΔT is known to. */
  readonly deltaTPercent: number;
}

/**
 * A permanent meter's ± from its class: each limit is the half-width of a rectangle, U = 2·limit/√3
 * (JCGM 100, 4.3.7), for energy the sum of all three parts, for volume the flow part, for ΔT the pair's.
 * It supposes a meter within its limits, which is what the comparison is to find out. Null where the
 * limits cannot be put. Example: class 2 at 0.42 q_p, 18.4 K, Δθ_min 3 K → energy 4.272153 %.
 */
export function meterClassUncertainty(state: MeterLimitState): MeterClassUncertainty | null {
  const limits = meterLimits(state);
  if (limits === null) return null;
  const expanded = (percent: number) => COVERAGE_FACTOR * standardFromHalfWidth(percent);
  return {
    limits,
    energyPercent: expandedFromLimitsPercent(limits),
    volumePercent: expanded(limits.flowPercent),
    deltaTPercent: expanded(limits.pairPercent),
  };
}
