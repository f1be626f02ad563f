import type { ReadingSegment } from "../reading-columns";
import { changeRows } from "./change-rows";
import type { CorrectionSpan } from "./correction-span";

export type Side = "supply" | "return";

/**
 * Adds to what one probe read, in K, over a span in which it sat on one side. A flow meter's own
 * power is left alone: what it worked with is not known.
 *
 * Example: +0.1 K on a return probe that read 12.80 °C gives 12.90 °C.
 */
export function probeOffset(
  segment: ReadingSegment,
  span: CorrectionSpan,
  side: Side,
  addK: number,
): ReadingSegment {
  return changeRows(segment, span, (_, inSpan) =>
    inSpan.map(side === "supply" ? "supplyC" : "returnC", (temperatureC) => temperatureC + addK),
  );
}

export const otherSide = (side: Side): Side => (side === "supply" ? "return" : "supply");
