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

const STRIDE = 27;

export class IntervalTable {
  /** `sums[base + Sum.x]`, with `base` from {@link baseAt}. */
  sums = new Float64Array(256 * STRIDE);
  private count = 0;

  /** Where the interval that holds `instantMs` stands; instants must come in order of interval. */
  baseAt(instantMs: number): number {
    const startMs = Math.floor(instantMs / INTERVAL_MS) * INTERVAL_MS;
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

  private column(offset: number): Float64Array {
    const column = new Float64Array(this.count);
    for (let i = 0; i < this.count; i++) column[i] = this.sums[i * STRIDE + offset]!;
    return column;
  }

  private register(offset: number): RegisterColumns {
    return {
      energyKwh: this.column(offset + RegisterSum.energyKwh),
      volumeM3: this.column(offset + RegisterSum.volumeM3),
      flowDeltaTM3K: this.column(offset + RegisterSum.flowDeltaTM3K),
      powerDeltaTKwhK: this.column(offset + RegisterSum.powerDeltaTKwhK),
      deltaTKs: this.column(offset + RegisterSum.deltaTKs),
      runningS: this.column(offset + RegisterSum.runningS),
    };
  }

  toColumns(): IntervalEnergyColumns {
    return {
      startMs: this.column(Sum.startMs),
      coveredS: this.column(Sum.coveredS),
      heating: this.register(Sum.heating),
      cooling: this.register(Sum.cooling),
      volumeM3: this.column(Sum.volumeM3),
      suppressedKwh: this.column(Sum.suppressedKwh),
      suppressedS: this.column(Sum.suppressedS),
      minPowerKw: this.column(Sum.minPowerKw),
      maxPowerKw: this.column(Sum.maxPowerKw),
      minFlowM3PerHour: this.column(Sum.minFlowM3PerHour),
      maxFlowM3PerHour: this.column(Sum.maxFlowM3PerHour),
      supplyCs: this.column(Sum.supplyCs),
      returnCs: this.column(Sum.returnCs),
      measuredRows: this.column(Sum.measuredRows),
      excludedRows: this.column(Sum.excludedRows),
      noReadingRows: this.column(Sum.noReadingRows),
      apportioned: Uint8Array.from(this.column(Sum.apportioned)),
    };
  }
}
