import type { Interval } from "../time/interval";
import type { IntervalEnergyColumns, RegisterColumns } from "./interval-energy";

/** What stored intervals add up to over a stretch of time. */
export interface EnergyTotals {
  readonly coveredS: number;
  readonly volumeM3: number;
  readonly suppressedKwh: number;
  readonly suppressedS: number;
  readonly heating: RegisterTotals;
  readonly cooling: RegisterTotals;
  /** Signed, heating positive; null where nothing is covered. */
  readonly minPowerKw: number | null;
  readonly maxPowerKw: number | null;
  readonly minFlowM3PerHour: number | null;
  readonly maxFlowM3PerHour: number | null;
  /** Means over the time water was measured; null where it never was. */
  readonly meanSupplyC: number | null;
  readonly meanReturnC: number | null;
  readonly measuredRows: number;
  readonly excludedRows: number;
  readonly noReadingRows: number;
  /** Whether any step was split at a boundary of these intervals. */
  readonly apportioned: boolean;
  /** Part of `coveredS` that only a permanent meter's power speaks for: without volume and ΔT. */
  readonly meterOnlyS: number;
  /** Rows of a meter's power against the register of the loop's service; they gave no energy. */
  readonly againstRows: number;
}

export interface RegisterTotals {
  readonly energyKwh: number;
  readonly volumeM3: number;
  readonly flowDeltaTM3K: number;
  readonly powerDeltaTKwhK: number;
  readonly deltaTKs: number;
  readonly runningS: number;
}

export interface PeriodTotals extends Interval, EnergyTotals {}

/** Sums of the intervals that start within `period`; everything where it is left out. */
export function totalEnergy(columns: IntervalEnergyColumns, period?: Interval): EnergyTotals {
  const from = period ? firstFrom(columns.startMs, period.startMs) : 0;
  const to = period ? firstFrom(columns.startMs, period.endMs) : columns.startMs.length;
  return sumRange(columns, from, to);
}

/**
 * Totals of each period, in the order given. Periods are hours or days of a site's zone; they start
 * on quarter hours in every zone in use, so each interval falls whole into one.
 */
export function sumIntervals(
  columns: IntervalEnergyColumns,
  periods: readonly Interval[],
): PeriodTotals[] {
  return periods.map(({ startMs, endMs }) => ({
    startMs,
    endMs,
    ...totalEnergy(columns, { startMs, endMs }),
  }));
}

/** Covered ÷ expected time, 0 to 1; null where the period has no length. */
export function completeness(totals: EnergyTotals, period: Interval): number | null {
  const expectedS = (period.endMs - period.startMs) / 1000;
  return expectedS > 0 ? totals.coveredS / expectedS : null;
}

/** The three means that are always printed together, in K; null where the register did not run. */
export interface DeltaTMeans {
  /** Σ(q·Δθ)/Σq: the one that gives the energy back from the volume. */
  readonly flowWeightedK: number | null;
  /** Σ(P·Δθ)/ΣP. */
  readonly energyWeightedK: number | null;
  /** Over the time the register ran; for people only. */
  readonly timeMeanK: number | null;
}

/** Seconds for which flow and temperatures were measured; volume and means are of this time. */
export function waterSeconds({
  coveredS,
  meterOnlyS,
}: Pick<EnergyTotals, "coveredS" | "meterOnlyS">): number {
  const seconds = coveredS - meterOnlyS;
  return seconds > ROUNDING_S ? seconds : 0;
}

/** What sums of seconds may differ by and still be the same time. */
export const ROUNDING_S = 1e-3;

/**
 * With time that only a meter's power speaks for, the register's energy and running time are not
 * those of its ΔT: only the flow-weighted mean, whose both sums are the water's, remains.
 */
export function deltaTMeans(register: RegisterTotals, meterOnlyS = 0): DeltaTMeans {
  const flowWeightedK = quotient(register.flowDeltaTM3K, register.volumeM3);
  if (meterOnlyS > 0) return { flowWeightedK, energyWeightedK: null, timeMeanK: null };
  return {
    flowWeightedK,
    energyWeightedK: quotient(register.powerDeltaTKwhK, register.energyKwh),
    timeMeanK: quotient(register.deltaTKs, register.runningS),
  };
}

function quotient(numerator: number, denominator: number): number | null {
  return denominator === 0 ? null : numerator / denominator;
}

function sumRange(columns: IntervalEnergyColumns, from: number, to: number): EnergyTotals {
  const coveredS = sum(columns.coveredS, from, to);
  const meterOnlyS = sum(columns.meterOnlyS, from, to);
  const waterS = waterSeconds({ coveredS, meterOnlyS });
  let apportioned = false;
  for (let i = from; i < to; i++) apportioned ||= columns.apportioned[i] === 1;
  return {
    coveredS,
    volumeM3: sum(columns.volumeM3, from, to),
    suppressedKwh: sum(columns.suppressedKwh, from, to),
    suppressedS: sum(columns.suppressedS, from, to),
    heating: sumRegister(columns.heating, from, to),
    cooling: sumRegister(columns.cooling, from, to),
    minPowerKw: extreme(columns.minPowerKw, from, to, Math.min),
    maxPowerKw: extreme(columns.maxPowerKw, from, to, Math.max),
    minFlowM3PerHour: extreme(columns.minFlowM3PerHour, from, to, Math.min),
    maxFlowM3PerHour: extreme(columns.maxFlowM3PerHour, from, to, Math.max),
    meanSupplyC: quotient(sum(columns.supplyCs, from, to), waterS),
    meanReturnC: quotient(sum(columns.returnCs, from, to), waterS),
    measuredRows: sum(columns.measuredRows, from, to),
    excludedRows: sum(columns.excludedRows, from, to),
    noReadingRows: sum(columns.noReadingRows, from, to),
    apportioned,
    meterOnlyS,
    againstRows: sum(columns.againstRows, from, to),
  };
}

function sumRegister(register: RegisterColumns, from: number, to: number): RegisterTotals {
  return {
    energyKwh: sum(register.energyKwh, from, to),
    volumeM3: sum(register.volumeM3, from, to),
    flowDeltaTM3K: sum(register.flowDeltaTM3K, from, to),
    powerDeltaTKwhK: sum(register.powerDeltaTKwhK, from, to),
    deltaTKs: sum(register.deltaTKs, from, to),
    runningS: sum(register.runningS, from, to),
  };
}

function sum(column: Float64Array, from: number, to: number): number {
  let total = 0;
  for (let i = from; i < to; i++) total += column[i]!;
  return total;
}

function extreme(
  column: Float64Array,
  from: number,
  to: number,
  better: (a: number, b: number) => number,
): number | null {
  let found: number | null = null;
  for (let i = from; i < to; i++) {
    const value = column[i]!;
    if (!Number.isNaN(value)) found = found === null ? value : better(found, value);
  }
  return found;
}

function firstFrom(startMs: Float64Array, ms: number): number {
  let low = 0;
  let high = startMs.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (startMs[middle]! < ms) low = middle + 1;
    else high = middle;
  }
  return low;
}
