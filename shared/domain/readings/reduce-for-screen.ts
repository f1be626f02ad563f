import type { Interval } from "../time/interval";

/** Points to draw as one line; a NaN value lifts the pen. */
export interface ScreenSeries {
  readonly instantMs: Float64Array;
  readonly values: Float64Array;
}

export interface ScreenWindow extends Interval {
  /** Width of the drawing in device pixels. */
  readonly pixels: number;
  /** A step longer than this is a hole. */
  readonly gapMs: number;
}

/**
 * What of a series a screen can show: the least and the greatest value of each pixel column, in the
 * order in which they occur, so that no peak is lost and never more than two points a pixel are
 * sent. Holes that empty a pixel column stay holes; a NaN among values of one pixel is not visible.
 * Where there are few enough rows they are sent as they are.
 */
export function reduceForScreen(
  instantMs: Float64Array,
  values: Float64Array,
  window: ScreenWindow,
): ScreenSeries {
  const from = firstAtOrAfter(instantMs, window.startMs);
  const to = firstAtOrAfter(instantMs, window.endMs);
  const most = 2 * window.pixels;
  if (to - from <= most) {
    const asIs = copyWithHoles(instantMs, values, from, to, window.gapMs);
    if (asIs.instantMs.length <= most) return asIs;
  }
  return leastAndGreatest(instantMs, values, from, to, window);
}

function copyWithHoles(
  instantMs: Float64Array,
  values: Float64Array,
  from: number,
  to: number,
  gapMs: number,
): ScreenSeries {
  const at = new Float64Array(2 * (to - from));
  const value = new Float64Array(2 * (to - from));
  let count = 0;
  for (let i = from; i < to; i++) {
    if (i > from && instantMs[i]! - instantMs[i - 1]! > gapMs) {
      at[count] = instantMs[i - 1]! + gapMs / 2;
      value[count++] = NaN;
    }
    at[count] = instantMs[i]!;
    value[count++] = values[i]!;
  }
  return { instantMs: at.slice(0, count), values: value.slice(0, count) };
}

function leastAndGreatest(
  instantMs: Float64Array,
  values: Float64Array,
  from: number,
  to: number,
  { startMs, endMs, pixels, gapMs }: ScreenWindow,
): ScreenSeries {
  const at = new Float64Array(2 * pixels);
  const value = new Float64Array(2 * pixels);
  const perPixel = (endMs - startMs) / pixels;
  let count = 0;
  let row = from;
  let lastRow = NaN;
  let penUp = true;
  for (let pixel = 0; pixel < pixels; pixel++) {
    const columnStart = startMs + pixel * perPixel;
    const columnEnd = pixel + 1 === pixels ? endMs : startMs + (pixel + 1) * perPixel;
    const firstRow = row;
    let least = -1;
    let greatest = -1;
    for (; row < to && instantMs[row]! < columnEnd; row++) {
      const v = values[row]!;
      if (v !== v) continue;
      if (least < 0 || v < values[least]!) least = row;
      if (greatest < 0 || v > values[greatest]!) greatest = row;
    }
    if (least >= 0) {
      const first = Math.min(least, greatest);
      const second = Math.max(least, greatest);
      at[count] = instantMs[first]!;
      value[count++] = values[first]!;
      if (second !== first) {
        at[count] = instantMs[second]!;
        value[count++] = values[second]!;
      }
      penUp = false;
      lastRow = instantMs[row - 1]!;
      continue;
    }
    // Nothing to draw: a hole if the rows here hold no value, or if no row came for long enough.
    const next = row < to ? instantMs[row]! : Infinity;
    if (!penUp && (row > firstRow || next - lastRow > gapMs)) {
      at[count] = columnStart;
      value[count++] = NaN;
      penUp = true;
    }
  }
  return { instantMs: at.slice(0, count), values: value.slice(0, count) };
}

/** Index of the first instant ≥ `ms`. */
export function firstAtOrAfter(instantMs: Float64Array, ms: number): number {
  let low = 0;
  let high = instantMs.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (instantMs[middle]! < ms) low = middle + 1;
    else high = middle;
  }
  return low;
}
