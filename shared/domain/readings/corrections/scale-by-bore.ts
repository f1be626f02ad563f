import type { ReadingSegment } from "../reading-columns";
import { changeRows } from "./change-rows";
import type { CorrectionSpan } from "./correction-span";

/**
 * By what the flow of a meter that was told a wrong bore has to be multiplied. A transit-time meter
 * measures the water's speed and multiplies it by the area of the bore it was told, so flow goes
 * with the bore's square.
 *
 * Example: told 102.26 mm in a pipe of 102.9651 mm → 1.013838.
 * @throws RangeError for a bore that is not above 0.
 */
export function boreFactor(enteredBoreMm: number, trueBoreMm: number): number {
  if (!(enteredBoreMm > 0) || !(trueBoreMm > 0)) throw new RangeError("a bore is above 0 mm");
  return (trueBoreMm / enteredBoreMm) ** 2;
}

/** Multiplies the flow of a span, and the power a meter worked out from it. */
export function scaleFlow(
  segment: ReadingSegment,
  span: CorrectionSpan,
  factor: number,
): ReadingSegment {
  const scale = (value: number) => value * factor;
  return changeRows(segment, span, (_, inSpan) => {
    inSpan.map("flowM3PerHour", scale);
    inSpan.map("powerKw", scale);
    inSpan.map("heatingKw", scale);
    inSpan.map("coolingKw", scale);
  });
}
