import type { LoopService } from "@shared/contracts/places";

/**
 * Cut-offs worth suggesting for a loop. None applies until somebody sets it.
 *
 * Flow: 2 % of the design flow, under which most clamp-on meters read their own zero error
 * (common practice, no source). ΔT: twice the standard uncertainty of a pair of class B probes that
 * nobody compared in one bath, limits 0.3 + 0.005·|t| K (IEC 60751) taken as rectangular, at the
 * usual temperatures of the service. Example: 6.9 and 12.8 °C → 2 × 0.285416 K.
 */
export function suggestedFlowCutOff(designFlowM3PerHour: number | null): number | null {
  return designFlowM3PerHour === null ? null : 0.02 * designFlowM3PerHour;
}

/** Standard uncertainty of the difference of two class B probes at these temperatures, K. */
export function uncheckedPairUncertaintyK(supplyC: number, returnC: number): number {
  const limit = (t: number) => 0.3 + 0.005 * Math.abs(t);
  return Math.hypot(limit(supplyC), limit(returnC)) / Math.sqrt(3);
}

const usualTemperaturesC: Readonly<Record<LoopService, readonly [number, number]>> = {
  chilled: [6, 12],
  hot: [80, 60],
  changeover: [45, 40],
};

/** To a tenth of a kelvin. */
export function suggestedDeltaTCutOffK(service: LoopService): number {
  const [supplyC, returnC] = usualTemperaturesC[service];
  return Math.round(20 * uncheckedPairUncertaintyK(supplyC, returnC)) / 10;
}
