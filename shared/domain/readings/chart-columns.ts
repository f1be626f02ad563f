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
  if (!(window.endMs > window.startMs) || !(window.most >= 1))
    throw new RangeError("a chart needs a stretch of time and room for at least one column");
  const parts = segments
    .map((segment) => partOf(segment, window))
    .filter((part) => part.to > part.from)
    .sort((a, b) => instantAt(a, a.from) - instantAt(b, b.from));
  const rows = parts.reduce((sum, part) => sum + part.to - part.from, 0);
  return rows <= window.most ? rowColumns(parts, rows) : meanColumns(parts, rows, window);
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

function meanColumns(parts: readonly Part[], rows: number, window: ChartWindow): ChartColumns {
  const columnMs = columnLengthMs(window, window.most);
  const before = Math.floor((window.startMs - window.anchorMs) / columnMs);
  const firstMs = window.anchorMs + before * columnMs;
  const columns = Math.ceil((window.endMs - firstMs) / columnMs);
  const flow = new ColumnSums(columns);
  const supply = new ColumnSums(columns);
  const ret = new ColumnSums(columns);
  for (const { segment, from, to } of parts) {
    const { instantMs, flowM3PerHour, supplyC, returnC, quality } = segment.columns;
    for (let row = from; row < to;) {
      const column = Math.floor(((instantMs[row] as number) - firstMs) / columnMs);
      const columnEndMs = firstMs + (column + 1) * columnMs;
      const first = row;
      do row++;
      while (row < to && (instantMs[row] as number) < columnEndMs);
      if (flowM3PerHour) flow.add(column, flowM3PerHour, quality, first, row);
      if (supplyC) supply.add(column, supplyC, quality, first, row);
      if (returnC) ret.add(column, returnC, quality, first, row);
    }
  }
  return {
    startMs: Float64Array.from({ length: columns }, (_, column) => firstMs + column * columnMs),
    columnMs,
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
