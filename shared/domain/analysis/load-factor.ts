import type { PeakDemand } from "../energy/demand";

/**
 * How even a load is: load factor = P̄ ÷ P_peak, with P̄ the energy over covered time.
 *
 * It means nothing without the peak it stands on, so it carries that with it. Between 0 and 1.
 * Source: "load factor" of the International Electrotechnical Vocabulary, part 691 (tariffs).
 * Example: 4211.075 kWh in 25 h with a rolling hour of 228.650 kW: 168.443 ÷ 228.650 = 0.7366849.
 */
export interface LoadFactor {
  readonly value: number;
  readonly meanKw: number;
  readonly peak: PeakDemand;
}

/** Null without a peak, at a peak of 0, or where nothing is covered. */
export function loadFactor(
  energyKwh: number,
  coveredS: number,
  peak: PeakDemand | null,
): LoadFactor | null {
  if (peak === null || peak.powerKw <= 0 || coveredS <= 0) return null;
  const meanKw = energyKwh / (coveredS / 3600);
  return { value: meanKw / peak.powerKw, meanKw, peak };
}

/**
 * Hours at full load that would have moved the same energy: E ÷ P, with P the peak or the design
 * power, h. Null where the power is unknown or 0. Example: 33812.65 kWh ÷ 518.1107 kW = 65.26 h.
 */
export function fullLoadHours(energyKwh: number, powerKw: number | null): number | null {
  return powerKw === null || powerKw <= 0 ? null : energyKwh / powerKw;
}
