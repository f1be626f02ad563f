import { READING_CHANNELS, type ReadingSegment } from "../reading-columns";
import type { FluidAtPressure } from "../../fluids/fluid-at-pressure";
import { fluidRows } from "./fluid-span";

/**
 * How many rows a correction of a stretch changes: a value, what the row is worth, or the fluid it is
 * worked out with. Both lists hold the same rows, as `correctSegments` leaves them.
 */
export function changedRows(
  before: readonly ReadingSegment[],
  after: readonly ReadingSegment[],
  loopFluid: FluidAtPressure | null,
): number {
  return before.reduce((sum, segment, index) => {
    const other = after[index];
    return other === undefined ? sum : sum + changedIn(segment, other, loopFluid);
  }, 0);
}

function changedIn(
  before: ReadingSegment,
  after: ReadingSegment,
  loopFluid: FluidAtPressure | null,
): number {
  if (before === after) return 0;
  const count = before.columns.instantMs.length;
  const changed = new Uint8Array(count);
  for (const channel of READING_CHANNELS) {
    const one = before.columns[channel] ?? null;
    const other = after.columns[channel] ?? null;
    if (one === other) continue;
    for (let row = 0; row < count; row++)
      if (!Object.is(one?.[row] ?? NaN, other?.[row] ?? NaN)) changed[row] = 1;
  }
  for (let row = 0; row < count; row++)
    if (before.columns.quality[row] !== after.columns.quality[row]) changed[row] = 1;
  if (before.fluids !== after.fluids && loopFluid !== null) {
    const was = fluidOfRows(before, loopFluid);
    fluidOfRows(after, loopFluid).forEach((fluid, row) => {
      if (fluid !== was[row]) changed[row] = 1;
    });
  }
  return changed.reduce((sum, mark) => sum + mark, 0);
}

function fluidOfRows(segment: ReadingSegment, loopFluid: FluidAtPressure): FluidAtPressure[] {
  return fluidRows(segment, loopFluid).flatMap(({ from, to, fluid }) =>
    Array.from({ length: to - from }, () => fluid),
  );
}
