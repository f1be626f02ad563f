import { ASHRAE_GLYCOL, type GlycolKind, LOWEST_TABLE_VOLUME_PERCENT } from "./glycol-ashrae";
import { isInterpolated } from "./glycol-at-pressure";
import { glycolConcentration, massFromVolumePercent } from "./glycol-concentration";
import { mixtureAt, type Mixture } from "./glycol-correlation";
import { HIGHEST_MELINDER_TABLE_C, MELINDER_GLYCOL } from "./glycol-melinder";
import type { LoopFluid } from "./loop-fluid";

export type FluidHeatReason =
  /** Two published correlations differ; which is right is not known. */
  | "correlationSpread"
  /** The second correlation is used above 40 °C, where its public tables end. */
  | "crossCheckExtrapolated"
  /** No table lies between water and 10 % by volume. */
  | "interpolatedToWater";

export interface FluidHeatUncertainty {
  /** Both terms together; standard uncertainty, percent of the heat coefficient. */
  readonly kPercent: number;
  readonly glycolSpreadPercent: number;
  readonly interpolationPercent: number;
  readonly reasons: readonly FluidHeatReason[];
}

/**
 * Half-width of the interpolation term halfway between water and 10 %, percent of ρ·cp.
 *
 * The ASHRAE fits continued below 10 % do not reach water: the real curve bends somewhere in
 * between, and nobody has published where. At 5 % the continued fits lie up to 1.48 % from the
 * straight line (ethylene glycol, 1 °C), so the truth is looked for within ± 1.5 % there; the width
 * runs out as a parabola towards water and towards 10 %, where values are known.
 */
export const INTERPOLATION_HALF_WIDTH_PERCENT = 1.5;

/**
 * What a glycol mixture adds to the uncertainty of the heat coefficient, at this supply and return
 * temperature in °C, beyond the density and enthalpy terms that water has as well. Water adds nothing.
 *
 * The spread is |k Melinder ÷ k ASHRAE − 1|, k = ρ(mean)·Δh/Δθ, taken as the half-width of a
 * rectangle: u = spread/√3. Between 0 and 10 % by volume the spread at 10 % counts in proportion, and
 * the interpolation adds its own rectangle. The concentration's own error is not in here. Null where
 * the concentration is not known or outside the tables.
 *
 * Example: 30 % ethylene glycol by mass at 6/12 °C → spread 0.49 %, u = 0.28 %.
 */
export function fluidHeatUncertaintyPercent(
  fluid: LoopFluid,
  supplyC: number,
  returnC: number,
): FluidHeatUncertainty | null {
  const nothing = { kPercent: 0, glycolSpreadPercent: 0, interpolationPercent: 0, reasons: [] };
  if (fluid.kind === "water") return nothing;
  const concentration = glycolConcentration(fluid.kind, fluid.percent, fluid.basis);
  if (concentration === null) return null;
  const { volumePercent } = concentration;
  if (volumePercent === 0) return nothing;
  const interpolated = isInterpolated(volumePercent);
  const share = Math.min(1, volumePercent / LOWEST_TABLE_VOLUME_PERCENT);
  const tablePercent = Math.max(volumePercent, LOWEST_TABLE_VOLUME_PERCENT);
  const glycolSpreadPercent =
    (share * correlationSpreadPercent(fluid.kind, tablePercent, supplyC, returnC)) / Math.sqrt(3);
  const interpolationPercent = interpolated
    ? (INTERPOLATION_HALF_WIDTH_PERCENT * 4 * share * (1 - share)) / Math.sqrt(3)
    : 0;
  const reasons: FluidHeatReason[] = ["correlationSpread"];
  if (Math.max(supplyC, returnC) > HIGHEST_MELINDER_TABLE_C) reasons.push("crossCheckExtrapolated");
  if (interpolated) reasons.push("interpolatedToWater");
  return {
    kPercent: Math.hypot(glycolSpreadPercent, interpolationPercent),
    glycolSpreadPercent,
    interpolationPercent,
    reasons,
  };
}

/** How far the two correlations' heat coefficients are apart, percent of the one we use; ≥ 0. */
export function correlationSpreadPercent(
  kind: GlycolKind,
  volumePercent: number,
  supplyC: number,
  returnC: number,
): number {
  const used = mixtureAt(ASHRAE_GLYCOL[kind], volumePercent / 100);
  const massFraction = massFromVolumePercent(kind, volumePercent) / 100;
  const second = mixtureAt(MELINDER_GLYCOL[kind], massFraction);
  return (
    100 * Math.abs(heatPerM3(second, supplyC, returnC) / heatPerM3(used, supplyC, returnC) - 1)
  );
}

/** Mean ρ·cp between two temperatures, kJ/(m³·K). */
function heatPerM3(mixture: Mixture, supplyC: number, returnC: number): number {
  const density = mixture.density((supplyC + returnC) / 2);
  if (supplyC === returnC) return density * mixture.heatCapacity(supplyC);
  const heat = mixture.enthalpy(supplyC) - mixture.enthalpy(returnC);
  return (density * heat) / (supplyC - returnC);
}
