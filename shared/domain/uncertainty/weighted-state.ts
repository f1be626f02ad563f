import type { RegisterTotals } from "../energy/totals";
import { flowAreaM2 } from "../pipes/bore";
import type { PeriodState } from "./combine-period";

/**
 * The means to which the systematic terms of a period are put, from a register's sums:
 * flow-weighted ΔT Σ(q·Δθ)/Σq, ΔT-weighted speed Σ(v·Δθ)/ΣΔθ, and the mean speed while it ran.
 *
 * These are what an offset works through: one of ΔT changes the energy by δ ÷ the first, one of the
 * zero by z ÷ the second. Null where the register did not run or the bore is not known.
 * Example: 100 m³, 500 m³·K and 72 000 K·s in 14 400 s, bore 100 mm → 5 K, 0.8842 and 0.8842 m/s.
 */
export function weightedState(
  register: RegisterTotals,
  boreMm: number | null,
): Pick<
  PeriodState,
  "flowWeightedDeltaTK" | "deltaTWeightedVelocityMPerS" | "meanVelocityMPerS" | "meanFlowM3PerHour"
> {
  const { volumeM3, flowDeltaTM3K, deltaTKs, runningS } = register;
  const area = boreMm === null ? null : flowAreaM2(boreMm);
  const meanFlowM3PerS = quotient(volumeM3, runningS);
  return {
    flowWeightedDeltaTK: quotient(flowDeltaTM3K, volumeM3),
    deltaTWeightedVelocityMPerS: area === null ? null : quotient(flowDeltaTM3K / area, deltaTKs),
    meanVelocityMPerS: area === null || meanFlowM3PerS === null ? null : meanFlowM3PerS / area,
    meanFlowM3PerHour: meanFlowM3PerS === null ? null : 3600 * meanFlowM3PerS,
  };
}

function quotient(part: number, whole: number): number | null {
  return whole > 0 ? part / whole : null;
}
