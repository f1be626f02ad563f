import type { FluidAtPressure } from "../../fluids/fluid-at-pressure";
import type { ReadingSegment } from "../reading-columns";
import { rowsInSpan, type CorrectionSpan, type RowRange } from "./correction-span";

/** A stretch in which another fluid than the loop's filled it. */
export interface FluidSpan extends CorrectionSpan {
  readonly fluid: FluidAtPressure;
}

/** Rows of one fluid. */
export interface FluidRows extends RowRange {
  readonly fluid: FluidAtPressure;
}

/** Says of a segment which fluid filled the loop within a span; its rows stay as they are. */
export function withFluid(segment: ReadingSegment, span: FluidSpan): ReadingSegment {
  const { from, to } = rowsInSpan(segment, span);
  if (from >= to) return segment;
  return { ...segment, fluids: [...(segment.fluids ?? []), span] };
}

/** All rows of a segment by the fluid they are worked out with, in order; `otherwise` is the loop's. */
export function fluidRows(segment: ReadingSegment, otherwise: FluidAtPressure): FluidRows[] {
  const count = segment.columns.instantMs.length;
  const ranges = (segment.fluids ?? [])
    .map((span) => ({ ...rowsInSpan(segment, span), fluid: span.fluid }))
    .filter(({ from, to }) => from < to)
    .sort((a, b) => a.from - b.from);
  const parts: FluidRows[] = [];
  let at = 0;
  for (const { from, to, fluid } of ranges) {
    // Spans of fluids never overlap; were they to, the earlier one would keep its rows.
    const start = Math.max(from, at);
    if (start >= to) continue;
    if (at < start) parts.push({ from: at, to: start, fluid: otherwise });
    parts.push({ from: start, to, fluid });
    at = to;
  }
  if (at < count) parts.push({ from: at, to: count, fluid: otherwise });
  return parts;
}
