import { waterSeconds, type EnergyTotals, type RegisterTotals } from "@shared/domain/energy/totals";

const noRegister: RegisterTotals = {
  energyKwh: 0,
  volumeM3: 0,
  flowDeltaTM3K: 0,
  powerDeltaTKwhK: 0,
  deltaTKs: 0,
  runningS: 0,
};

/** The totals of stretches that do not overlap, as one. Means are weighted by the time of their water. */
export function combineTotals(parts: readonly EnergyTotals[]): EnergyTotals {
  const sum = (of: (part: EnergyTotals) => number) =>
    parts.reduce((total, part) => total + of(part), 0);
  const coveredS = sum((part) => part.coveredS);
  const waterS = sum(waterSeconds);
  const mean = (of: (part: EnergyTotals) => number | null) =>
    waterS === 0 ? null : sum((part) => (of(part) ?? 0) * waterSeconds(part)) / waterS;
  const extreme = (of: (part: EnergyTotals) => number | null, better: typeof Math.min) =>
    parts.reduce<number | null>((best, part) => {
      const value = of(part);
      if (value === null) return best;
      return best === null ? value : better(best, value);
    }, null);
  const register = (name: "heating" | "cooling"): RegisterTotals => {
    const keys = Object.keys(noRegister) as (keyof RegisterTotals)[];
    return Object.fromEntries(
      keys.map((key) => [key, sum((part) => part[name][key])]),
    ) as unknown as RegisterTotals;
  };
  return {
    coveredS,
    volumeM3: sum((part) => part.volumeM3),
    suppressedKwh: sum((part) => part.suppressedKwh),
    suppressedS: sum((part) => part.suppressedS),
    heating: register("heating"),
    cooling: register("cooling"),
    minPowerKw: extreme((part) => part.minPowerKw, Math.min),
    maxPowerKw: extreme((part) => part.maxPowerKw, Math.max),
    minFlowM3PerHour: extreme((part) => part.minFlowM3PerHour, Math.min),
    maxFlowM3PerHour: extreme((part) => part.maxFlowM3PerHour, Math.max),
    meanSupplyC: mean((part) => part.meanSupplyC),
    meanReturnC: mean((part) => part.meanReturnC),
    measuredRows: sum((part) => part.measuredRows),
    excludedRows: sum((part) => part.excludedRows),
    noReadingRows: sum((part) => part.noReadingRows),
    apportioned: parts.some((part) => part.apportioned),
    meterOnlyS: sum((part) => part.meterOnlyS),
    againstRows: sum((part) => part.againstRows),
  };
}
