import type { ReadingSegment } from "../reading-columns";
import { changeRows } from "./change-rows";
import type { CorrectionSpan } from "./correction-span";

/**
 * Turns the sign of the flow within a span, for a meter mounted against the water, and with it the
 * sign of what the meter made of it. Doing it twice gives the original.
 */
export function flipFlow(segment: ReadingSegment, span: CorrectionSpan): ReadingSegment {
  const flip = (value: number) => 0 - value;
  return changeRows(segment, span, (_, inSpan) => {
    inSpan.map("flowM3PerHour", flip);
    inSpan.map("powerKw", flip);
    inSpan.exchange("heatingKw", "coolingKw");
  });
}
