import { waterSeconds, type EnergyTotals, type RegisterTotals } from "@shared/domain/energy/totals";

type Sums<Totals> = { -readonly [Name in keyof Totals]: Totals[Name] };

const noRegister = (): Sums<RegisterTotals> => ({
  energyKwh: 0,
  volumeM3: 0,
  flowDeltaTM3K: 0,
  powerDeltaTKwhK: 0,
  deltaTKs: 0,
  runningS: 0,
});

/** The totals of stretches that do not overlap, as one. Means are weighted by the time of their water. */
export function combineTotals(parts: readonly EnergyTotals[]): EnergyTotals {
  const heating = noRegister();
  const cooling = noRegister();
  const sums: Sums<EnergyTotals> = {
    coveredS: 0,
    volumeM3: 0,
    suppressedKwh: 0,
    suppressedS: 0,
    heating,
    cooling,
    minPowerKw: null,
    maxPowerKw: null,
    minFlowM3PerHour: null,
    maxFlowM3PerHour: null,
    meanSupplyC: null,
    meanReturnC: null,
    measuredRows: 0,
    excludedRows: 0,
    noReadingRows: 0,
    apportioned: false,
    meterOnlyS: 0,
    againstRows: 0,
  };
  let waterS = 0;
  let supplyCs = 0;
  let returnCs = 0;
  // One pass without a function made in it: a year of hours is 8,760 parts.
  for (const part of parts) {
    const partWaterS = waterSeconds(part);
    waterS += partWaterS;
    supplyCs += (part.meanSupplyC ?? 0) * partWaterS;
    returnCs += (part.meanReturnC ?? 0) * partWaterS;
    sums.coveredS += part.coveredS;
    sums.volumeM3 += part.volumeM3;
    sums.suppressedKwh += part.suppressedKwh;
    sums.suppressedS += part.suppressedS;
    addRegister(heating, part.heating);
    addRegister(cooling, part.cooling);
    sums.minPowerKw = lesser(sums.minPowerKw, part.minPowerKw);
    sums.maxPowerKw = greater(sums.maxPowerKw, part.maxPowerKw);
    sums.minFlowM3PerHour = lesser(sums.minFlowM3PerHour, part.minFlowM3PerHour);
    sums.maxFlowM3PerHour = greater(sums.maxFlowM3PerHour, part.maxFlowM3PerHour);
    sums.measuredRows += part.measuredRows;
    sums.excludedRows += part.excludedRows;
    sums.noReadingRows += part.noReadingRows;
    sums.apportioned ||= part.apportioned;
    sums.meterOnlyS += part.meterOnlyS;
    sums.againstRows += part.againstRows;
  }
  if (waterS === 0) return sums;
  return { ...sums, meanSupplyC: supplyCs / waterS, meanReturnC: returnCs / waterS };
}

function addRegister(sums: Sums<RegisterTotals>, part: RegisterTotals): void {
  sums.energyKwh += part.energyKwh;
  sums.volumeM3 += part.volumeM3;
  sums.flowDeltaTM3K += part.flowDeltaTM3K;
  sums.powerDeltaTKwhK += part.powerDeltaTKwhK;
  sums.deltaTKs += part.deltaTKs;
  sums.runningS += part.runningS;
}

function lesser(a: number | null, b: number | null): number | null {
  if (a === null || b === null) return a ?? b;
  return b < a ? b : a;
}

function greater(a: number | null, b: number | null): number | null {
  if (a === null || b === null) return a ?? b;
  return b > a ? b : a;
}
