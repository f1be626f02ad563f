import {
  deltaTMeans,
  waterSeconds,
  type EnergyTotals,
  type RegisterTotals,
} from "@shared/domain/energy/totals";
import type { Interval } from "@shared/domain/time/interval";
import type { EnergyRow } from "@server/queries/energy/energy-rows";
import type { RegisterName } from "@server/queries/energy/loads";

/** Sums of one register over a stretch, as a ± needs them. */
export interface PartSums {
  readonly energyKwh: number;
  /** Of the register, and of all covered time. */
  readonly volumeM3: number;
  readonly allVolumeM3: number;
  readonly flowDeltaTM3K: number;
  readonly deltaTKs: number;
  readonly runningS: number;
  /** Time in which water moved, whatever it carried. */
  readonly movingS: number;
  readonly coveredS: number;
  readonly meterOnlyS: number;
  /** Rows read while the register ran. */
  readonly samples: number;
  readonly meanSupplyC: number | null;
  readonly meanReturnC: number | null;
  readonly flowSpreadM3PerHour: number | null;
  /** ΔT moved by this much at least: the distance between its means. Null where there is one at most. */
  readonly deltaTSpreadK: number | null;
  /** Start of the last row with readings; null where none has any. */
  readonly lastCoveredMs: number | null;
}

/**
 * Sums over `within`. A row that its ends cut counts by the share of its time: a day in which an
 * installation begins belongs to both by the hour.
 */
export function sumsWithin(
  rows: readonly EnergyRow[],
  within: Interval,
  register: RegisterName,
): PartSums {
  const sums = {
    energyKwh: 0,
    volumeM3: 0,
    allVolumeM3: 0,
    flowDeltaTM3K: 0,
    deltaTKs: 0,
    runningS: 0,
    movingS: 0,
    coveredS: 0,
    meterOnlyS: 0,
    samples: 0,
  };
  let waterS = 0;
  let supplyCs = 0;
  let returnCs = 0;
  let lastCoveredMs: number | null = null;
  const flow = new Extremes();
  const deltaT = new Extremes();
  for (const row of rows) {
    const overlapMs = Math.min(row.endMs, within.endMs) - Math.max(row.startMs, within.startMs);
    if (overlapMs <= 0) continue;
    const share = overlapMs / (row.endMs - row.startMs);
    const { totals } = row;
    const own = totals[register];
    sums.energyKwh += share * own.energyKwh;
    sums.volumeM3 += share * own.volumeM3;
    sums.allVolumeM3 += share * totals.volumeM3;
    sums.flowDeltaTM3K += share * own.flowDeltaTM3K;
    sums.deltaTKs += share * own.deltaTKs;
    sums.runningS += share * own.runningS;
    sums.movingS += share * movingSeconds(totals);
    sums.coveredS += share * totals.coveredS;
    sums.meterOnlyS += share * totals.meterOnlyS;
    sums.samples += share * samplesOf(totals, own);
    const water = share * waterSeconds(totals);
    waterS += water;
    supplyCs += water * (totals.meanSupplyC ?? 0);
    returnCs += water * (totals.meanReturnC ?? 0);
    flow.see(totals.minFlowM3PerHour, totals.maxFlowM3PerHour);
    for (const mean of Object.values(deltaTMeans(own, totals.meterOnlyS))) deltaT.see(mean);
    if (totals.coveredS > 0) lastCoveredMs = Math.max(row.startMs, within.startMs);
  }
  return {
    ...sums,
    meanSupplyC: waterS > 0 ? supplyCs / waterS : null,
    meanReturnC: waterS > 0 ? returnCs / waterS : null,
    flowSpreadM3PerHour: flow.spread,
    deltaTSpreadK: deltaT.spread,
    lastCoveredMs,
  };
}

function movingSeconds({ heating, cooling, suppressedS }: EnergyTotals): number {
  return heating.runningS + cooling.runningS + suppressedS;
}

function samplesOf({ measuredRows, coveredS }: EnergyTotals, { runningS }: RegisterTotals): number {
  return coveredS > 0 ? (measuredRows * runningS) / coveredS : 0;
}

class Extremes {
  private least: number | null = null;
  private greatest: number | null = null;

  see(...values: readonly (number | null)[]): void {
    for (const value of values) {
      if (value === null) continue;
      this.least = Math.min(this.least ?? value, value);
      this.greatest = Math.max(this.greatest ?? value, value);
    }
  }

  get spread(): number | null {
    return this.least === null || this.greatest === null ? null : this.greatest - this.least;
  }
}
