import type { EnergyAnswer, EnergyTotals } from "@shared/contracts/energy";

import type { RegisterName } from "./register-words";

/** One row of the energy table, in stored units; null where nothing is covered. */
export interface EnergyTableRow {
  readonly key: string;
  readonly startMs: number | null;
  readonly supplyC: number | null;
  readonly returnC: number | null;
  readonly deltaTK: number | null;
  readonly flowM3PerHour: number | null;
  readonly volumeM3: number | null;
  readonly kwh: Readonly<Record<RegisterName, number | null>>;
  readonly missingS: number;
}

/** Mean flow over the time that is covered, not over the whole step. */
function meanFlow(volumeM3: number | null, coveredS: number): number | null {
  return volumeM3 === null || coveredS === 0 ? null : volumeM3 / (coveredS / 3600);
}

/** A second or two of rounding is no loss worth a word. */
const leastMissingS = 2;

export function energyTableRows(
  columns: NonNullable<EnergyAnswer["columns"]>,
  expectedUntilMs: number,
): EnergyTableRow[] {
  return columns.startMs.map((startMs, i) => {
    const volumeM3 = columns.volumeM3[i] ?? null;
    const coveredS = columns.coveredS[i] ?? 0;
    const endMs = startMs + (columns.lengthS[i] ?? 0) * 1000;
    const expectedS = Math.max(0, Math.min(endMs, expectedUntilMs) - startMs) / 1000;
    const missingS = Math.max(0, expectedS - coveredS);
    return {
      key: String(startMs),
      startMs,
      supplyC: columns.meanSupplyC[i] ?? null,
      returnC: columns.meanReturnC[i] ?? null,
      deltaTK: columns.flowWeightedDeltaTK[i] ?? null,
      flowM3PerHour: meanFlow(volumeM3, coveredS),
      volumeM3,
      kwh: { heating: columns.heatingKwh[i] ?? null, cooling: columns.coolingKwh[i] ?? null },
      missingS: missingS < leastMissingS ? 0 : missingS,
    };
  });
}

/** The sum row: energies add up, means are weighted by covered time, ΔT by flow. */
export function totalRow(
  totals: EnergyTotals,
  rows: readonly EnergyTableRow[],
  columns: NonNullable<EnergyAnswer["columns"]>,
): EnergyTableRow {
  const weighted = (values: readonly (number | null)[]) => {
    let sum = 0;
    let weight = 0;
    values.forEach((value, i) => {
      const covered = columns.coveredS[i] ?? 0;
      if (value === null) return;
      sum += value * covered;
      weight += covered;
    });
    return weight === 0 ? null : sum / weight;
  };
  const longer =
    totals.heating.runningS > totals.cooling.runningS ? totals.heating : totals.cooling;
  return {
    key: "total",
    startMs: null,
    supplyC: weighted(columns.meanSupplyC),
    returnC: weighted(columns.meanReturnC),
    deltaTK: longer.flowWeightedDeltaTK,
    flowM3PerHour: meanFlow(totals.volumeM3, totals.coveredS),
    volumeM3: totals.volumeM3,
    kwh: { heating: totals.heating.energyKwh, cooling: totals.cooling.energyKwh },
    missingS: rows.reduce((sum, row) => sum + row.missingS, 0),
  };
}
