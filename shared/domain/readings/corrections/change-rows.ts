import type { ReadingChannel, ReadingColumns, ReadingSegment } from "../reading-columns";
import { rowsInSpan, type CorrectionSpan, type RowRange } from "./correction-span";

/** What may be done to the rows of a span; every change is made in a copy. */
export interface RowChanges {
  map(channel: ReadingChannel, change: (value: number) => number): void;
  /** Two channels change places; one that only one of them holds is NaN outside the span. */
  exchange(first: ReadingChannel, second: ReadingChannel): void;
}

type Mutable = { -readonly [Key in keyof ReadingColumns]: ReadingColumns[Key] };

/** The segment with the rows of a span changed. Rows, their instants and what they are worth stay. */
export function changeRows(
  segment: ReadingSegment,
  span: CorrectionSpan,
  change: (columns: ReadingColumns, inSpan: RowChanges) => void,
): ReadingSegment {
  const range = rowsInSpan(segment, span);
  if (range.from >= range.to) return segment;
  const changed: Mutable = { ...segment.columns };
  change(segment.columns, {
    map(channel, apply) {
      const values = changed[channel];
      if (values) changed[channel] = mapped(values, range, apply);
    },
    exchange(first, second) {
      const one = changed[first] ?? null;
      const other = changed[second] ?? null;
      if (one === null && other === null) return;
      changed[first] = withRows(one, other, range, segment.columns);
      changed[second] = withRows(other, one, range, segment.columns);
    },
  });
  return { ...segment, columns: changed };
}

function mapped(values: Float64Array, { from, to }: RowRange, apply: (value: number) => number) {
  const copy = values.slice();
  for (let row = from; row < to; row++) copy[row] = apply(copy[row]!);
  return copy;
}

/** `outside`, with the rows of the range from `inside`; null where neither holds anything. */
function withRows(
  outside: Float64Array | null,
  inside: Float64Array | null,
  { from, to }: RowRange,
  { instantMs }: ReadingColumns,
): Float64Array | null {
  const isWhole = from === 0 && to === instantMs.length;
  if (inside === null && (outside === null || isWhole)) return null;
  const values = outside ? outside.slice() : new Float64Array(instantMs.length).fill(NaN);
  if (inside) values.set(inside.subarray(from, to), from);
  else values.fill(NaN, from, to);
  return values;
}
