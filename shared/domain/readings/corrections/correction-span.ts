import type { Interval } from "../../time/interval";
import type { ReadingSegment } from "../reading-columns";

/** A stretch that a correction speaks for; an open end is Infinity. */
export type CorrectionSpan = Interval;

/** Rows `from` ≤ index < `to`. */
export interface RowRange {
  readonly from: number;
  readonly to: number;
}

/**
 * The rows of a segment that belong to a span: those whose instant lies in [start, end). A mean
 * labelled with its end belongs to the time before its label, so its label lies in (start, end].
 */
export function rowsInSpan(
  { kind, columns }: Pick<ReadingSegment, "kind" | "columns">,
  { startMs, endMs }: CorrectionSpan,
): RowRange {
  const after = kind === "meanToLabel" ? 1 : 0;
  // Instants are whole milliseconds, so "later than" is "from a millisecond later".
  return {
    from: firstFrom(columns.instantMs, startMs + after),
    to: firstFrom(columns.instantMs, endMs + after),
  };
}

export function spansOverlap(a: CorrectionSpan, b: CorrectionSpan): boolean {
  return a.startMs < b.endMs && b.startMs < a.endMs;
}

/** What two spans share; null where nothing. */
export function sharedSpan(a: CorrectionSpan, b: CorrectionSpan): CorrectionSpan | null {
  const startMs = Math.max(a.startMs, b.startMs);
  const endMs = Math.min(a.endMs, b.endMs);
  return startMs < endMs ? { startMs, endMs } : null;
}

/** The first row at or after an instant; as many as there are rows where none is. */
export function firstFrom(instantMs: Float64Array | Uint32Array, ms: number): number {
  let low = 0;
  let high = instantMs.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (instantMs[middle]! < ms) low = middle + 1;
    else high = middle;
  }
  return low;
}
