import type { FluidAtPressure } from "../fluids/fluid-at-pressure";
import type { MeterSide } from "./power";

/**
 * Heat coefficient k = ρ(θ_m)·[h(θ₁) − h(θ₂)] / (θ₁ − θ₂): the heat that one m³ at the flow meter
 * carries for each kelvin. The form of EN 1434-1 and OIML R 75-1 (from memory).
 *
 * Example: water at 1.6 MPa, 70/40 °C, meter in the return → 4.148534 MJ/(m³·K) = 1.152371 kWh/(m³·K);
 * in the supply → 4.088194 MJ/(m³·K).
 */
export interface HeatCoefficient {
  readonly mjPerM3K: number;
  readonly kwhPerM3K: number;
}

const KJ_PER_KWH = 3600;

/**
 * Temperatures in °C. At equal temperatures it is the limit ρ·cp. Null where the fluid is not liquid
 * or not known at either.
 */
export function heatCoefficient(
  fluid: FluidAtPressure,
  meterSide: MeterSide,
  supplyC: number,
  returnC: number,
): HeatCoefficient | null {
  const liquid = [supplyC, returnC].every((t) => t >= fluid.lowestC && t <= fluid.highestC);
  if (!liquid) return null;
  const density = fluid.density(meterSide === "supply" ? supplyC : returnC);
  const heat =
    supplyC === returnC
      ? fluid.heatCapacity(supplyC)
      : (fluid.enthalpy(supplyC) - fluid.enthalpy(returnC)) / (supplyC - returnC);
  const kjPerM3K = density * heat;
  return { mjPerM3K: kjPerM3K / 1000, kwhPerM3K: kjPerM3K / KJ_PER_KWH };
}

/**
 * E = k·V·(θ₁ − θ₂) in kWh, heating positive, for a volume in m³ that flowed at steady temperatures.
 * Example: 2.4 m³ of water at 6.90/12.80 °C and 1.6 MPa, meter in the return → −16.4832 kWh.
 */
export function energyOfVolumeKwh(
  coefficient: HeatCoefficient,
  volumeM3: number,
  supplyC: number,
  returnC: number,
): number {
  return coefficient.kwhPerM3K * volumeM3 * (supplyC - returnC);
}
