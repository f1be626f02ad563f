import type { ReadingSegment } from "../reading-columns";
import { changeRows } from "./change-rows";
import type { CorrectionSpan } from "./correction-span";

/**
 * What was the wrong way round. `probes`: the probes sat on the other pipes than was recorded, so
 * what is known of a probe goes with its readings to the other side, and a meter that worked with
 * them wrote its power with the wrong sign. `channels`: the logger's channels were named the wrong
 * way round, while probes and meter were where they were said to be.
 */
export type SwappedThing = "probes" | "channels";

/** Exchanges supply and return temperatures within a span. Doing it twice gives the original. */
export function swapSides(
  segment: ReadingSegment,
  span: CorrectionSpan,
  swapped: SwappedThing,
): ReadingSegment {
  return changeRows(segment, span, (columns, inSpan) => {
    inSpan.exchange("supplyC", "returnC");
    if (swapped === "channels") return;
    inSpan.map("powerKw", (kw) => 0 - kw);
    inSpan.exchange("heatingKw", "coolingKw");
  });
}
