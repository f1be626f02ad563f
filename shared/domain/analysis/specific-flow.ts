import { KWH_PER } from "../units/energy-and-power";
import { M3_PER_HOUR_PER_US_GPM } from "../units/flow";

/**
 * Water moved for the energy it carried: the same ratio in three ways of saying it.
 *
 * m³/kWh = V ÷ E; L/s per kW = V ÷ (3.6·E); US gpm per ton = the same in the inch-pound units of
 * NIST SP 811, where the rule of thumb is 24 ÷ Δθ in °F.
 * Example: 12/6 °C with the meter on the return moves 0.0397551 L/s for each kW.
 */
export interface SpecificFlow {
  readonly m3PerKwh: number;
  readonly litresPerSecondPerKw: number;
  readonly gpmPerTon: number;
}

/** Null without energy: nothing was carried. */
export function specificFlow(volumeM3: number, energyKwh: number): SpecificFlow | null {
  if (!(energyKwh > 0)) return null;
  const m3PerKwh = volumeM3 / energyKwh;
  return {
    m3PerKwh,
    litresPerSecondPerKw: m3PerKwh / 3.6,
    gpmPerTon: (m3PerKwh / M3_PER_HOUR_PER_US_GPM) * KWH_PER["ton-h"],
  };
}
