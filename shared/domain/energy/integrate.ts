import { forEachCoveredStep, SURVEY_GAP_FACTOR } from "../readings/covered-steps";
import { RowQuality, type ReadingColumns, type ReadingSegment } from "../readings/reading-columns";
import type { Interval } from "../time/interval";
import { INTERVAL_MS, type IntervalEnergyColumns } from "./interval-energy";
import { IntervalTable, RegisterSum, Sum } from "./interval-table";
import { Register, samplePower, type PowerOptions, type SamplePower } from "./power";

/**
 * Heating and cooling energy of resolved readings, in 15-minute intervals of UTC.
 *
 * Power is formed and sorted into a register for every sample, then summed: instantaneous rows by
 * the trapezoid between neighbours of each register, means as value × step. Both registers are ≥ 0
 * and never netted. What a step is, and where there is none, is said in `covered-steps`. A step that
 * crosses an interval's boundary is split in proportion to time and both parts are marked
 * apportioned. Extremes are those of the rows whose steps reach into the interval, power as it
 * counts: 0 where a cut-off holds it back.
 *
 * Example: 28.8 m³/h on the return at 6.90 → 12.80 °C for 300 s cools 16.4832 kWh.
 */
export interface IntegrationOptions extends PowerOptions {
  /** A step over this many nominal steps is a hole; 3 for a survey. */
  readonly gapFactor?: number;
  /** Counts only what lies within; null or left out counts everything. */
  readonly window?: Interval | null;
}

/** @throws RangeError where instants do not ascend or segments overlap. */
export function integrateEnergy(
  segments: readonly ReadingSegment[],
  options: IntegrationOptions,
): IntervalEnergyColumns {
  const table = new IntervalTable();
  const powers = segments.map(({ columns }) => samplePower(columns, options));
  const samples = segments.map(({ columns }, s) => new Samples(columns, powers[s]!));
  const windowStart = options.window?.startMs ?? -Infinity;
  const windowEnd = options.window?.endMs ?? Infinity;

  forEachCoveredStep(
    segments,
    powers.map((power) => power.register),
    options.gapFactor ?? SURVEY_GAP_FACTOR,
    (firstSegment, firstRow, secondSegment, secondRow, stepFrom, stepTo) => {
      const from = stepFrom > windowStart ? stepFrom : windowStart;
      const to = stepTo < windowEnd ? stepTo : windowEnd;
      let at = from;
      while (at < to) {
        const base = table.baseAt(at);
        const intervalEnd = table.sums[base]! + INTERVAL_MS;
        const end = to < intervalEnd ? to : intervalEnd;
        // Half of the piece's weight to either end: the trapezoid; a mean has both halves itself.
        const halfSeconds = (end - at) / 2000;
        samples[firstSegment]!.addTo(table.sums, base, firstRow, halfSeconds);
        samples[secondSegment]!.addTo(table.sums, base, secondRow, halfSeconds);
        if (at !== stepFrom || end !== stepTo) table.sums[base + Sum.apportioned] = 1;
        at = end;
      }
    },
    (segment, row) => {
      const instant = segments[segment]!.columns.instantMs[row]!;
      if (instant < windowStart || instant >= windowEnd) return;
      const base = table.baseAt(instant);
      if (powers[segment]!.register[row] !== Register.unusable) {
        table.sums[base + Sum.measuredRows]! += 1;
      } else if (segments[segment]!.columns.quality[row] === RowQuality.excluded) {
        table.sums[base + Sum.excludedRows]! += 1;
      } else {
        table.sums[base + Sum.noReadingRows]! += 1;
      }
    },
  );
  return table.toColumns();
}

const EMPTY = new Float64Array(0);

/** The rows of one segment, as what each adds to an interval for a weight of time. */
class Samples {
  private readonly flow: Float64Array;
  private readonly supply: Float64Array;
  private readonly back: Float64Array;
  private readonly power: Float64Array;
  private readonly register: Uint8Array;

  constructor(columns: ReadingColumns, { powerKw, register }: SamplePower) {
    this.flow = columns.flowM3PerHour ?? EMPTY;
    this.supply = columns.supplyC ?? EMPTY;
    this.back = columns.returnC ?? EMPTY;
    this.power = powerKw;
    this.register = register;
  }

  addTo(sums: Float64Array, base: number, row: number, seconds: number): void {
    const flow = this.flow[row]!;
    const supply = this.supply[row]!;
    const back = this.back[row]!;
    const register = this.register[row]!;
    const hours = seconds / 3600;
    const volume = flow * hours;
    let counted = this.power[row]!;
    sums[base + Sum.coveredS]! += seconds;
    sums[base + Sum.volumeM3]! += volume;
    sums[base + Sum.supplyCs]! += supply * seconds;
    sums[base + Sum.returnCs]! += back * seconds;

    if (register === Register.heating || register === Register.cooling) {
      const heating = register === Register.heating;
      const at = base + (heating ? Sum.heating : Sum.cooling);
      const energy = (heating ? counted : -counted) * hours;
      const deltaT = heating ? supply - back : back - supply;
      sums[at + RegisterSum.energyKwh]! += energy;
      sums[at + RegisterSum.volumeM3]! += volume;
      sums[at + RegisterSum.flowDeltaTM3K]! += volume * deltaT;
      sums[at + RegisterSum.powerDeltaTKwhK]! += energy * deltaT;
      sums[at + RegisterSum.deltaTKs]! += deltaT * seconds;
      sums[at + RegisterSum.runningS]! += seconds;
    } else {
      if (register === Register.suppressed) {
        sums[base + Sum.suppressedKwh]! += Math.abs(counted) * hours;
        sums[base + Sum.suppressedS]! += seconds;
      }
      counted = 0;
    }
    // NaN, the start value, fails every comparison.
    if (!(sums[base + Sum.minPowerKw]! <= counted)) sums[base + Sum.minPowerKw] = counted;
    if (!(sums[base + Sum.maxPowerKw]! >= counted)) sums[base + Sum.maxPowerKw] = counted;
    if (!(sums[base + Sum.minFlowM3PerHour]! <= flow)) sums[base + Sum.minFlowM3PerHour] = flow;
    if (!(sums[base + Sum.maxFlowM3PerHour]! >= flow)) sums[base + Sum.maxFlowM3PerHour] = flow;
  }
}
