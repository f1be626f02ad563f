import { forEachCoveredStep, SURVEY_GAP_FACTOR } from "../readings/covered-steps";
import { RowQuality, type ReadingColumns, type ReadingSegment } from "../readings/reading-columns";
import type { Interval } from "../time/interval";
import { INTERVAL_MS, type IntervalEnergyColumns } from "./interval-energy";
import { IntervalTable, RegisterSum, Sum } from "./interval-table";
import { Register, type PowerOptions, type SamplePower } from "./power";
import { segmentPower } from "./segment-power";

// Taken out of their modules once: looking an import up for every row costs more than the sum.
const LENGTH_MS = INTERVAL_MS;
const { unusable: UNUSABLE, heating: HEATING, cooling: COOLING, suppressed: SUPPRESSED } = Register;
const { against: AGAINST, both: BOTH } = Register;
const { excluded: EXCLUDED, opening: OPENING } = RowQuality;
const SUM = Sum;
const { energyKwh, volumeM3, flowDeltaTM3K, powerDeltaTKwhK, deltaTKs, runningS } = RegisterSum;

/**
 * Heating and cooling energy of resolved readings, in 15-minute intervals of UTC.
 *
 * Power is formed and sorted into a register for every sample, then summed: instantaneous rows by
 * the trapezoid between neighbours of each register, means as value × step. Both registers are ≥ 0
 * and never netted. What a step is, and where there is none, is said in `covered-steps`. A step that
 * crosses an interval's boundary is split in proportion to time and both parts are marked
 * apportioned. Extremes are those of the rows whose steps reach into the interval, power as it
 * counts: 0 where a cut-off holds it back. Time that only a permanent meter's power speaks for adds
 * energy and leaves volume, temperatures and ΔT alone; it is summed apart, so that their means stay
 * means over the time they were measured in.
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
  const table = new IntervalTable(expectedIntervals(segments));
  const powers = segments.map((segment) => segmentPower(segment, options));
  const rows = segments.map(({ columns }, s) => new SegmentRows(columns, powers[s]!));
  const windowStart = options.window?.startMs ?? -Infinity;
  const windowEnd = options.window?.endMs ?? Infinity;

  // A row ends one step and starts the next, mostly in one interval: its weight is gathered first.
  let heldSegment = -1;
  let heldRow = -1;
  let heldBase = -1;
  let heldSeconds = 0;
  const release = () => {
    if (heldSegment >= 0) rows[heldSegment]!.addTo(table.sums, heldBase, heldRow, heldSeconds);
  };
  const hold = (segment: number, row: number, base: number, seconds: number) => {
    if (row === heldRow && base === heldBase && segment === heldSegment) {
      heldSeconds += seconds;
      return;
    }
    release();
    heldSegment = segment;
    heldRow = row;
    heldBase = base;
    heldSeconds = seconds;
  };

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
        const intervalEnd = table.sums[base]! + LENGTH_MS;
        const end = to < intervalEnd ? to : intervalEnd;
        // Half of the piece's weight to either end: the trapezoid; a mean has both halves itself.
        const halfSeconds = (end - at) / 2000;
        hold(firstSegment, firstRow, base, halfSeconds);
        hold(secondSegment, secondRow, base, halfSeconds);
        if (at !== stepFrom || end !== stepTo) table.sums[base + SUM.apportioned] = 1;
        at = end;
      }
    },
    (segment, row) => {
      const instant = segments[segment]!.columns.instantMs[row]!;
      if (instant < windowStart || instant >= windowEnd) return;
      const base = table.baseAt(instant);
      table.sums[base + rows[segment]!.countedAs(row)]! += 1;
      if (powers[segment]!.register[row] === AGAINST) table.sums[base + SUM.againstRows]! += 1;
    },
  );
  release();
  return table.toColumns();
}

/** Room for the usual file: as many intervals as its span has, within reason. */
function expectedIntervals(segments: readonly ReadingSegment[]): number {
  let spanMs = 0;
  for (const { columns } of segments) {
    const { instantMs } = columns;
    if (instantMs.length > 0) spanMs += instantMs[instantMs.length - 1]! - instantMs[0]!;
  }
  return Math.min(Math.ceil(spanMs / INTERVAL_MS) + 2 * segments.length + 2, 40_000);
}

const EMPTY = new Float64Array(0);

/** The rows of one segment, as what each adds to an interval for a weight of time. */
class SegmentRows {
  private readonly flow: Float64Array;
  private readonly supply: Float64Array;
  private readonly back: Float64Array;
  private readonly power: Float64Array;
  private readonly register: Uint8Array;
  private readonly quality: Uint8Array;
  private readonly meterOnly: Uint8Array | null;
  private readonly heatingKw: Float64Array;
  private readonly coolingKw: Float64Array;

  constructor(columns: ReadingColumns, { powerKw, register, meterOnly }: SamplePower) {
    this.flow = columns.flowM3PerHour ?? EMPTY;
    this.supply = columns.supplyC ?? EMPTY;
    this.back = columns.returnC ?? EMPTY;
    this.power = powerKw;
    this.register = register;
    this.quality = columns.quality;
    this.meterOnly = meterOnly;
    this.heatingKw = columns.heatingKw ?? EMPTY;
    this.coolingKw = columns.coolingKw ?? EMPTY;
  }

  /** The sum in which a row is counted. */
  countedAs(row: number): number {
    if (this.register[row] !== UNUSABLE) return SUM.measuredRows;
    // The reading that opens a counter's first step was read like the others.
    if (this.quality[row] === OPENING) return SUM.measuredRows;
    return this.quality[row] === EXCLUDED ? SUM.excludedRows : SUM.noReadingRows;
  }

  /** Energy by the meter alone: power of one register, or of both, for a weight of time. */
  private addMetered(sums: Float64Array, base: number, row: number, seconds: number): void {
    sums[base + SUM.coveredS]! += seconds;
    sums[base + SUM.meterOnlyS]! += seconds;
    const register = this.register[row]!;
    const hours = seconds / 3600;
    const power = this.power[row]!;
    if (register === HEATING || register === COOLING) {
      const at = base + (register === HEATING ? SUM.heating : SUM.cooling);
      sums[at + energyKwh]! += Math.abs(power) * hours;
      sums[at + runningS]! += seconds;
    } else if (register === BOTH) {
      sums[base + SUM.heating + energyKwh]! += this.heatingKw[row]! * hours;
      sums[base + SUM.heating + runningS]! += seconds;
      sums[base + SUM.cooling + energyKwh]! += this.coolingKw[row]! * hours;
      sums[base + SUM.cooling + runningS]! += seconds;
      // Its water moved, but belongs to neither register alone.
      const volume = this.flow[row]! * hours;
      if (volume === volume) sums[base + SUM.volumeM3]! += volume;
    }
    const counted = register === AGAINST ? 0 : power;
    if (!(sums[base + SUM.minPowerKw]! <= counted)) sums[base + SUM.minPowerKw] = counted;
    if (!(sums[base + SUM.maxPowerKw]! >= counted)) sums[base + SUM.maxPowerKw] = counted;
  }

  addTo(sums: Float64Array, base: number, row: number, seconds: number): void {
    if (this.meterOnly !== null && this.meterOnly[row] === 1) {
      this.addMetered(sums, base, row, seconds);
      return;
    }
    const flow = this.flow[row]!;
    const supply = this.supply[row]!;
    const back = this.back[row]!;
    const register = this.register[row]!;
    const hours = seconds / 3600;
    const volume = flow * hours;
    let counted = this.power[row]!;
    sums[base + SUM.coveredS]! += seconds;
    sums[base + SUM.volumeM3]! += volume;
    sums[base + SUM.supplyCs]! += supply * seconds;
    sums[base + SUM.returnCs]! += back * seconds;

    if (register === HEATING || register === COOLING) {
      const heating = register === HEATING;
      const at = base + (heating ? SUM.heating : SUM.cooling);
      const energy = (heating ? counted : -counted) * hours;
      const deltaT = heating ? supply - back : back - supply;
      sums[at + energyKwh]! += energy;
      sums[at + volumeM3]! += volume;
      sums[at + flowDeltaTM3K]! += volume * deltaT;
      sums[at + powerDeltaTKwhK]! += energy * deltaT;
      sums[at + deltaTKs]! += deltaT * seconds;
      sums[at + runningS]! += seconds;
    } else {
      if (register === SUPPRESSED) {
        sums[base + SUM.suppressedKwh]! += Math.abs(counted) * hours;
        sums[base + SUM.suppressedS]! += seconds;
      }
      counted = 0;
    }
    // NaN, the start value, fails every comparison.
    if (!(sums[base + SUM.minPowerKw]! <= counted)) sums[base + SUM.minPowerKw] = counted;
    if (!(sums[base + SUM.maxPowerKw]! >= counted)) sums[base + SUM.maxPowerKw] = counted;
    if (!(sums[base + SUM.minFlowM3PerHour]! <= flow)) sums[base + SUM.minFlowM3PerHour] = flow;
    if (!(sums[base + SUM.maxFlowM3PerHour]! >= flow)) sums[base + SUM.maxFlowM3PerHour] = flow;
  }
}
