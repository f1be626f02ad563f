import type { Interval } from "../../time/interval";
import type { RowRange } from "../corrections/correction-span";
import type { ReadingSegment } from "../reading-columns";

/**
 * The time of a range of rows: from its first row to the row after it, though never over more than
 * one nominal step, so that a gap behind it stays out. The rows of that span are exactly the range
 * again (see `rowsInSpan`), whichever way the logger labels its rows.
 *
 * Example: rows 1 and 2 of quarter-hours from 12:00 → [12:15, 12:45), or (12:00, 12:30] for means
 * labelled with their end.
 */
export function spanOfRows(
  { kind, columns, nominalStepMs }: ReadingSegment,
  { from, to }: RowRange,
): Interval {
  const { instantMs } = columns;
  const first = instantMs[from]!;
  const last = instantMs[to - 1]!;
  const step = Math.max(1, nominalStepMs);
  if (kind === "meanToLabel") {
    const before = from > 0 ? instantMs[from - 1]! : -Infinity;
    return { startMs: Math.max(first - step, before), endMs: last };
  }
  const after = to < instantMs.length ? instantMs[to]! : Infinity;
  return { startMs: first, endMs: Math.min(last + step, after) };
}

/** Ascending row indexes as ranges; touching rows are one range. */
export function rangesOfRows(rows: Iterable<number>): RowRange[] {
  const ranges: { from: number; to: number }[] = [];
  for (const row of rows) {
    const last = ranges.at(-1);
    if (last && last.to === row) last.to = row + 1;
    else ranges.push({ from: row, to: row + 1 });
  }
  return ranges;
}

/** Rows with a mark as ranges. */
export function rangesOfMarks(marks: Uint8Array): RowRange[] {
  const ranges: RowRange[] = [];
  let from = marks.indexOf(1);
  while (from >= 0) {
    const end = marks.indexOf(0, from);
    const to = end < 0 ? marks.length : end;
    ranges.push({ from, to });
    from = marks.indexOf(1, to);
  }
  return ranges;
}

/** Ranges with the time they stand for and how many rows they hold: a finding's place. */
export function placeOf(
  segment: ReadingSegment,
  rows: readonly RowRange[],
): {
  readonly rows: readonly RowRange[];
  readonly rowCount: number;
  readonly spans: readonly Interval[];
} {
  return {
    rows,
    rowCount: rows.reduce((sum, { from, to }) => sum + to - from, 0),
    spans: rows.map((range) => spanOfRows(segment, range)),
  };
}

/** All rows of a segment that holds at least one, as one range. */
export function wholePlace(segment: ReadingSegment) {
  return placeOf(segment, [{ from: 0, to: segment.columns.instantMs.length }]);
}
