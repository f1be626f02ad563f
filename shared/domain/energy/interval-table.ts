import { INTERVAL_MS, type IntervalEnergyColumns, type RegisterColumns } from "./interval-energy";

/**
 * Intervals while they are being summed: one row of numbers each, because a step touches all of an
 * interval's sums at once. Turned into columns at the end.
 */
export const Sum = {
  startMs: 0,
  coveredS: 1,
  volumeM3: 2,
  suppressedKwh: 3,
  suppressedS: 4,
  minPowerKw: 5,
  maxPowerKw: 6,
  minFlowM3PerHour: 7,
  maxFlowM3PerHour: 8,
  supplyCs: 9,
  returnCs: 10,
  measuredRows: 11,
  excludedRows: 12,
  noReadingRows: 13,
  apportioned: 14,
  heating: 15,
  cooling: 21,
  meterOnlyS: 27,
  againstRows: 28,
} as const;

/** Offsets inside a register, from `Sum.heating` or `Sum.cooling`. */
export const RegisterSum = {
  energyKwh: 0,
  volumeM3: 1,
  flowDeltaTM3K: 2,
  powerDeltaTKwhK: 3,
  deltaTKs: 4,
  runningS: 5,
} as const;

const STRIDE = 29;
/** Taken out of its module once: it is asked for every row. */
const LENGTH_MS = INTERVAL_MS;

export class IntervalTable {
  /** `sums[base + Sum.x]`, with `base` from {@link baseAt}. */
  sums: Float64Array;
  private count = 0;

  /** `expected` intervals fit without growing; it may be wrong. */
  constructor(expected: number) {
    this.sums = new Float64Array(Math.max(1, expected) * STRIDE);
  }

  /** Where the interval that holds `instantMs` stands; instants must come in order of interval. */
  baseAt(instantMs: number): number {
    const startMs = Math.floor(instantMs / LENGTH_MS) * LENGTH_MS;
    const last = (this.count - 1) * STRIDE;
    if (this.count > 0 && this.sums[last] === startMs) return last;
    if (this.count > 0 && this.sums[last]! > startMs) {
      throw new RangeError(
        `Interval ${startMs} comes after a later one; order the readings first.`,
      );
    }
    return this.append(startMs);
  }

  private append(startMs: number): number {
    const base = this.count * STRIDE;
    if (base + STRIDE > this.sums.length) {
      const larger = new Float64Array(this.sums.length * 2);
      larger.set(this.sums);
      this.sums = larger;
    }
    this.count++;
    this.sums[base] = startMs;
    this.sums[base + Sum.minPowerKw] = NaN;
    this.sums[base + Sum.maxPowerKw] = NaN;
    this.sums[base + Sum.minFlowM3PerHour] = NaN;
    this.sums[base + Sum.maxFlowM3PerHour] = NaN;
    return base;
  }

  toColumns(): IntervalEnergyColumns {
    const { sums, count } = this;
    const all = Array.from({ length: STRIDE }, () => new Float64Array(count));
    // Row by row, so that memory is read once in order.
    for (let i = 0, at = 0; i < count; i++, at += STRIDE) {
      for (let offset = 0; offset < STRIDE; offset++) all[offset]![i] = sums[at + offset]!;
    }
    const register = (offset: number): RegisterColumns => ({
      energyKwh: all[offset + RegisterSum.energyKwh]!,
      volumeM3: all[offset + RegisterSum.volumeM3]!,
      flowDeltaTM3K: all[offset + RegisterSum.flowDeltaTM3K]!,
      powerDeltaTKwhK: all[offset + RegisterSum.powerDeltaTKwhK]!,
      deltaTKs: all[offset + RegisterSum.deltaTKs]!,
      runningS: all[offset + RegisterSum.runningS]!,
    });
    return {
      startMs: all[Sum.startMs]!,
      coveredS: all[Sum.coveredS]!,
      heating: register(Sum.heating),
      cooling: register(Sum.cooling),
      volumeM3: all[Sum.volumeM3]!,
      suppressedKwh: all[Sum.suppressedKwh]!,
      suppressedS: all[Sum.suppressedS]!,
      minPowerKw: all[Sum.minPowerKw]!,
      maxPowerKw: all[Sum.maxPowerKw]!,
      minFlowM3PerHour: all[Sum.minFlowM3PerHour]!,
      maxFlowM3PerHour: all[Sum.maxFlowM3PerHour]!,
      supplyCs: all[Sum.supplyCs]!,
      returnCs: all[Sum.returnCs]!,
      measuredRows: all[Sum.measuredRows]!,
      excludedRows: all[Sum.excludedRows]!,
      noReadingRows: all[Sum.noReadingRows]!,
      apportioned: Uint8Array.from(all[Sum.apportioned]!),
      meterOnlyS: all[Sum.meterOnlyS]!,
      againstRows: all[Sum.againstRows]!,
    };
  }
}
