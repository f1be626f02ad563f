import type { IntervalEnergyColumns, RegisterColumns } from "@shared/domain/energy/interval-energy";

/** Fully covered quarter hours of cooling at the given mean powers, from `startMs` on. */
export function intervalColumns(
  startMs: number,
  powerKw: readonly number[],
): IntervalEnergyColumns {
  const count = powerKw.length;
  const filled = (value: number) => new Float64Array(count).fill(value);
  const register = (energyKwh: Float64Array): RegisterColumns => ({
    energyKwh,
    volumeM3: filled(0),
    flowDeltaTM3K: filled(0),
    powerDeltaTKwhK: filled(0),
    deltaTKs: filled(0),
    runningS: filled(0),
  });
  return {
    startMs: Float64Array.from({ length: count }, (_, i) => startMs + i * 900_000),
    coveredS: filled(900),
    heating: register(filled(0)),
    cooling: register(Float64Array.from(powerKw, (kw) => kw / 4)),
    volumeM3: filled(0),
    suppressedKwh: filled(0),
    suppressedS: filled(0),
    minPowerKw: filled(NaN),
    maxPowerKw: filled(NaN),
    minFlowM3PerHour: filled(NaN),
    maxFlowM3PerHour: filled(NaN),
    supplyCs: filled(0),
    returnCs: filled(0),
    measuredRows: filled(1),
    excludedRows: filled(0),
    noReadingRows: filled(0),
    apportioned: new Uint8Array(count),
    meterOnlyS: filled(0),
    againstRows: filled(0),
  };
}
