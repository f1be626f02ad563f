import { DAY_MS, HOUR_MS, MINUTE_MS, type Interval } from "../time/interval";
import { RowQuality, type ReadingSegment } from "./reading-columns";

/**
 * What a chart can show of readings: one entry a drawn column, all arrays of one length.
 *
 * Where there are few rows each is its own column and its values are as read. Otherwise a column is
 * a stretch of one round length; a line shows the plain mean of its measured rows and the envelope
 * their least and greatest value, so no peak is lost. NaN lifts the pen: a column without a measured
 * row, and one entry between two rows further apart than three nominal steps.
 *
 * Example: 10,080 one-minute rows on 352 columns become 336 half hours.
 */
export interface ChartColumns {
  /** First instant of each column, UTC ms, ascending; a row's own instant where columns are rows. */
  readonly startMs: Float64Array;
  /** Length of every column; null where columns are rows. */
  readonly columnMs: number | null;
  readonly flowM3PerHour: Float64Array;
  readonly supplyC: Float64Array;
  readonly returnC: Float64Array;
  /** Null where columns are rows. */
  readonly envelope: ChartEnvelope | null;
  /** Rows of any quality inside the window. */
  readonly rows: number;
}

export interface ChartEnvelope {
  readonly supplyLeastC: Float64Array;
  readonly supplyGreatestC: Float64Array;
  readonly returnLeastC: Float64Array;
  readonly returnGreatestC: Float64Array;
  readonly flowGreatestM3PerHour: Float64Array;
}

/** Lengths people name; a chart says "half-hour means", never "37-minute means". */
const roundLengthsMs: readonly number[] = [
  ...[1, 2, 5, 10, 15, 20, 30].map((seconds) => seconds * 1000),
  ...[1, 2, 5, 10, 15, 20, 30].map((minutes) => minutes * MINUTE_MS),
  ...[1, 2, 3, 4, 6, 8, 12].map((hours) => hours * HOUR_MS),
  ...[1, 2, 7, 14, 28].map((days) => days * DAY_MS),
];

/** The shortest round length with which `window` has at most `most` columns. */
export function columnLengthMs(window: Interval, most: number): number {
  const least = (window.endMs - window.startMs) / most;
  const round = roundLengthsMs.find((length) => length >= least);
  return round ?? Math.ceil(least / DAY_MS) * DAY_MS;
}

export interface ChartWindow extends Interval {
  /** Most columns to make; a row more and rows become means. */
  readonly most: number;
  /** A column starts here: the local midnight before the window, so that days are whole columns. */
  readonly anchorMs: number;
}

/** @throws RangeError for a window without length or room for no column. */
export function chartColumns(
  segments: readonly ReadingSegment[],
  window: ChartWindow,
): ChartColumns {
  const chart = new ChartBuilder(window);
  chart.add(segments);
  return chart.columns();
}

/**
 * Makes {@link chartColumns} of readings that come a stretch of time after the other, so that a year
 * of rows need never be held at once.
 */
export class ChartBuilder {
  private rows = 0;
  private readonly kept: Part[] = [];
  private means: MeanColumns | null = null;

  /** @throws RangeError for a window without length or room for no column. */
  constructor(private readonly window: ChartWindow) {
    if (!(window.endMs > window.startMs) || !(window.most >= 1))
      throw new RangeError("a chart needs a stretch of time and room for at least one column");
  }

  /** Whether the rows so far are few enough for each to be its own column. */
  get isOfRows(): boolean {
    return this.means === null;
  }

  /** Adds segments of one stretch of time; a later call's rows must follow those before. */
  add(segments: readonly ReadingSegment[]): void {
    const parts = segments
      .map((segment) => partOf(segment, this.window))
      .filter((part) => part.to > part.from)
      .sort((a, b) => instantAt(a, a.from) - instantAt(b, b.from));
    this.rows += parts.reduce((sum, part) => sum + part.to - part.from, 0);
    if (this.means === null) this.kept.push(...parts);
    else for (const part of parts) this.means.add(part);
    if (this.means !== null || this.rows <= this.window.most) return;
    this.means = new MeanColumns(this.window);
    for (const part of this.kept.splice(0)) this.means.add(part);
  }

  columns(): ChartColumns {
    return this.means?.columns(this.rows) ?? rowColumns(this.kept, this.rows);
  }
}

/** Where the columns of means lie. */
export interface ColumnFrame {
  /** Start of the first column, at or before the window's. */
  readonly firstMs: number;
  readonly columnMs: number;
  readonly count: number;
}

/** Columns of at least `leastMs`, no more of them than the window has room for. */
export function columnFrame(window: ChartWindow, leastMs = 0): ColumnFrame {
  const columnMs = Math.max(leastMs, columnLengthMs(window, window.most));
  const before = Math.floor((window.startMs - window.anchorMs) / columnMs);
  const firstMs = window.anchorMs + before * columnMs;
  return { firstMs, columnMs, count: Math.ceil((window.endMs - firstMs) / columnMs) };
}

/** Start of each column of the frame, UTC ms. */
export function columnStarts({ firstMs, columnMs, count }: ColumnFrame): Float64Array {
  return Float64Array.from({ length: count }, (_, column) => firstMs + column * columnMs);
}

interface Part {
  readonly segment: ReadingSegment;
  readonly from: number;
  readonly to: number;
}

function instantAt({ segment }: Part, row: number): number {
  return segment.columns.instantMs[row] as number;
}

function partOf(segment: ReadingSegment, { startMs, endMs }: Interval): Part {
  const { instantMs } = segment.columns;
  return {
    segment,
    from: firstAtOrAfter(instantMs, startMs),
    to: firstAtOrAfter(instantMs, endMs),
  };
}

function firstAtOrAfter(instantMs: Float64Array, ms: number): number {
  let low = 0;
  let high = instantMs.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((instantMs[middle] as number) < ms) low = middle + 1;
    else high = middle;
  }
  return low;
}

function measured(channel: Float64Array | null, quality: Uint8Array, row: number): number {
  return channel === null || quality[row] !== RowQuality.measured ? NaN : (channel[row] as number);
}

function rowColumns(parts: readonly Part[], rows: number): ChartColumns {
  const startMs: number[] = [];
  const flow: number[] = [];
  const supply: number[] = [];
  const ret: number[] = [];
  const put = (at: number, q: number, s: number, r: number) => {
    startMs.push(at);
    flow.push(q);
    supply.push(s);
    ret.push(r);
  };
  let previous = NaN;
  for (const { segment, from, to } of parts) {
    const { instantMs, flowM3PerHour, supplyC, returnC, quality } = segment.columns;
    for (let row = from; row < to; row++) {
      const at = instantMs[row] as number;
      if (at - previous > 3 * segment.nominalStepMs)
        put(previous + segment.nominalStepMs, NaN, NaN, NaN);
      put(
        at,
        measured(flowM3PerHour, quality, row),
        measured(supplyC, quality, row),
        measured(returnC, quality, row),
      );
      previous = at;
    }
  }
  return {
    startMs: Float64Array.from(startMs),
    columnMs: null,
    flowM3PerHour: Float64Array.from(flow),
    supplyC: Float64Array.from(supply),
    returnC: Float64Array.from(ret),
    envelope: null,
    rows,
  };
}

// Looking an import up for every row costs more than the sum.
const MEASURED = RowQuality.measured;

/** Sum, count, least and greatest of one channel per column. */
class ColumnSums {
  readonly least: Float64Array;
  readonly greatest: Float64Array;
  private readonly sum: Float64Array;
  private readonly count: Uint32Array;

  constructor(columns: number) {
    this.sum = new Float64Array(columns);
    this.count = new Uint32Array(columns);
    this.least = new Float64Array(columns).fill(NaN);
    this.greatest = new Float64Array(columns).fill(NaN);
  }

  /** The measured rows `from` ≤ row < `to`, all of one column; a NaN is no reading. */
  add(column: number, values: Float64Array, quality: Uint8Array, from: number, to: number): void {
    let sum = 0;
    let count = 0;
    let least = Infinity;
    let greatest = -Infinity;
    for (let row = from; row < to; row++) {
      const value = values[row] as number;
      if (value !== value || quality[row] !== MEASURED) continue;
      sum += value;
      count++;
      if (value < least) least = value;
      if (value > greatest) greatest = value;
    }
    if (count === 0) return;
    this.sum[column] = (this.sum[column] as number) + sum;
    this.count[column] = (this.count[column] as number) + count;
    // Written so that the first value replaces NaN.
    if (!(least >= (this.least[column] as number))) this.least[column] = least;
    if (!(greatest <= (this.greatest[column] as number))) this.greatest[column] = greatest;
  }

  means(): Float64Array {
    return this.sum.map((sum, column) => sum / (this.count[column] as number));
  }
}

class MeanColumns {
  private readonly frame: ColumnFrame;
  private readonly flow: ColumnSums;
  private readonly supply: ColumnSums;
  private readonly ret: ColumnSums;

  constructor(window: ChartWindow) {
    this.frame = columnFrame(window);
    const { count } = this.frame;
    this.flow = new ColumnSums(count);
    this.supply = new ColumnSums(count);
    this.ret = new ColumnSums(count);
  }

  add({ segment, from, to }: Part): void {
    const { firstMs, columnMs } = this.frame;
    const { instantMs, flowM3PerHour, supplyC, returnC, quality } = segment.columns;
    for (let row = from; row < to;) {
      const column = Math.floor(((instantMs[row] as number) - firstMs) / columnMs);
      const columnEndMs = firstMs + (column + 1) * columnMs;
      const first = row;
      do row++;
      while (row < to && (instantMs[row] as number) < columnEndMs);
      if (flowM3PerHour) this.flow.add(column, flowM3PerHour, quality, first, row);
      if (supplyC) this.supply.add(column, supplyC, quality, first, row);
      if (returnC) this.ret.add(column, returnC, quality, first, row);
    }
  }

  columns(rows: number): ChartColumns {
    const { flow, supply, ret } = this;
    return {
      startMs: columnStarts(this.frame),
      columnMs: this.frame.columnMs,
      flowM3PerHour: flow.means(),
      supplyC: supply.means(),
      returnC: ret.means(),
      envelope: {
        supplyLeastC: supply.least,
        supplyGreatestC: supply.greatest,
        returnLeastC: ret.least,
        returnGreatestC: ret.greatest,
        flowGreatestM3PerHour: flow.greatest,
      },
      rows,
    };
  }
}
