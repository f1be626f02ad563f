import { standardFromHalfWidth } from "./distributions";
import type { ProbeClass } from "./point-evidence";
import { classLimitK } from "./probe-class";

/** One probe of a pair nobody compared, and where it measures. */
export interface UncheckedProbe {
  readonly probeClass: ProbeClass;
  readonly temperatureC: number;
}

/**
 * Standard uncertainty of ΔT from two probes that were never compared, K: each error lies somewhere
 * within its class limits (rectangle), and the two are independent, u² = (a₁² + a₂²)/3. JCGM 100,
 * 4.3.7 and 5.1; limits from IEC 60751.
 *
 * Example: two class B probes at 6.9 and 12.8 °C → 0.285416 K, more than any flow error of a good
 * survey. A comparison in one bath takes it to a tenth.
 */
export function pairUncertaintyFromClassK(first: UncheckedProbe, second: UncheckedProbe): number {
  return Math.hypot(
    standardFromHalfWidth(classLimitK(first.probeClass, first.temperatureC)),
    standardFromHalfWidth(classLimitK(second.probeClass, second.temperatureC)),
  );
}
