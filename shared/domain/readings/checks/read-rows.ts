import type { RowRange } from "../corrections/correction-span";
import { RowQuality, type ReadingSegment } from "../reading-columns";

// Taken out of its module once: it is compared with in every row.
const MEASURED = RowQuality.measured;

/**
 * The rows of a channel that a check may believe: measured, and holding a value. Null where the
 * segment has no such channel.
 * @param range looks at the rows from ≤ row < to alone
 */
export function readRows(
  segment: ReadingSegment,
  values: Float64Array | null | undefined,
  range?: RowRange,
) {
  if (!values) return null;
  const { quality } = segment.columns;
  const { from, to } = range ?? { from: 0, to: values.length };
  const rows = new Uint32Array(to - from);
  let count = 0;
  for (let row = from; row < to; row++) {
    const value = values[row]!;
    // NaN is the one value that differs from itself.
    if (value === value && quality[row] === MEASURED) rows[count++] = row;
  }
  return rows.subarray(0, count);
}

/**
 * How much a row weighs among others: the time to the next one, at most one nominal step, so that a
 * gap adds nothing to the row before it. The last row weighs one nominal step.
 */
export function rowWeightMs({ columns, nominalStepMs }: ReadingSegment, row: number): number {
  const step = Math.max(1, nominalStepMs);
  const { instantMs } = columns;
  if (row + 1 >= instantMs.length) return step;
  return Math.min(step, instantMs[row + 1]! - instantMs[row]!);
}

/** Median of values, in no particular order; reorders them. Null of none. */
export function medianOf(values: Float64Array): number | null {
  if (values.length === 0) return null;
  values.sort();
  const middle = values.length >> 1;
  return values.length % 2 === 1 ? values[middle]! : (values[middle - 1]! + values[middle]!) / 2;
}

/** At most `most` entries from across a list, evenly spaced: enough for a percentile of a year. */
export function sampleOf(rows: Uint32Array, most: number): Uint32Array {
  if (rows.length <= most) return rows;
  const step = rows.length / most;
  return Uint32Array.from({ length: most }, (_, i) => rows[Math.floor(i * step)]!);
}
