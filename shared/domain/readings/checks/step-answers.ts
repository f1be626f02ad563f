import type { ReadingSegment } from "../reading-columns";
import { medianOf } from "./read-rows";
import { MIDDLE, SIDE } from "./step-jumps";

export type StepChannel = "flowM3PerHour" | "supplyC" | "returnC";

const ANSWER_SHARE = 0.3;
const FLOW_ANSWER = 0.05;
const LEAST_ANSWER_K = 0.15;

/** Whether another channel moved as water would make it move. */
export function answers(
  segment: ReadingSegment,
  channel: StepChannel,
  row: number,
  jump: number,
): boolean {
  const { flowM3PerHour, supplyC, returnC } = segment.columns;
  if (channel !== "flowM3PerHour") {
    const other = moveAt(segment, channel === "supplyC" ? returnC : supplyC, row);
    if (other && other.moved > ANSWER_SHARE * Math.abs(jump)) return true;
    const flow = moveAt(segment, flowM3PerHour, row);
    return (
      flow !== null &&
      flow.moved > FLOW_ANSWER * Math.max(Math.abs(flow.before), Math.abs(flow.after))
    );
  }
  const supply = moveAt(segment, supplyC, row);
  const returned = moveAt(segment, returnC, row);
  const deltaTK = supply && returned ? Math.abs(supply.before - returned.before) : 0;
  const expectedK = Math.abs(Math.expm1(-jump)) * deltaTK;
  const answerK = Math.max(LEAST_ANSWER_K, ANSWER_SHARE * expectedK);
  return [supply, returned].some((move) => move !== null && move.moved > answerK);
}

/**
 * Medians of a channel's 5 rows before a row and of the 5 from it on, and how far apart they are beyond
 * the drift on both sides; null where too little is read.
 */
function moveAt({ columns }: ReadingSegment, values: Float64Array | null, row: number) {
  if (!values) return null;
  const before = levelFrom(values, row - SIDE);
  const after = levelFrom(values, row);
  if (before === null || after === null) return null;
  const { instantMs } = columns;
  const earlier = levelFrom(values, row - 2 * SIDE) ?? before;
  const later = levelFrom(values, row + SIDE) ?? after;
  const rates =
    rateFrom(instantMs, row - 2 * SIDE, before - earlier) + rateFrom(instantMs, row, later - after);
  const betweenMs = middleMs(instantMs, row) - middleMs(instantMs, row - SIDE);
  return { before, after, moved: Math.abs(after - before - (rates / 2) * betweenMs) };
}

// Functions of their own: made anew for every jump, they took more time than what they do.
function levelFrom(values: Float64Array, from: number): number | null {
  const known = values
    .slice(Math.max(0, from), Math.max(0, from + SIDE))
    .filter((value) => !Number.isNaN(value));
  return known.length < 3 ? null : medianOf(known)!;
}

function middleMs(instantMs: Float64Array, from: number): number {
  return instantMs[Math.min(instantMs.length - 1, Math.max(0, from) + MIDDLE)]!;
}

function rateFrom(instantMs: Float64Array, from: number, change: number): number {
  return change === 0 ? 0 : change / (middleMs(instantMs, from + SIDE) - middleMs(instantMs, from));
}
