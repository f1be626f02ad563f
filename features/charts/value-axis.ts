import { tickStep } from "d3-array";

/** A vertical axis with round ticks, in the unit shown. */
export interface ValueAxis {
  readonly low: number;
  readonly high: number;
  /** Values of the grid lines, ascending, both ends included. */
  readonly ticks: readonly number[];
  /** Decimals every tick is written with. */
  readonly decimals: number;
}

/**
 * Round ticks round [least, greatest]; one step of air below keeps the lowest curve off the panel
 * underneath. Equal or missing ends still make an axis, so an empty chart has a frame.
 */
export function temperatureAxis(extent: readonly [number, number] | null): ValueAxis {
  const [least, greatest] = extent ?? [0, 10];
  const spread = Math.max(greatest - least, 2);
  const step = tickStep(0, spread, 4);
  const low = Math.floor(least / step) * step - step;
  const high = Math.ceil((greatest + spread * 0.04) / step) * step;
  return axis(low, high, step);
}

/** From zero (or below it, where flow was negative) in two steps: the panel is low. */
export function flowAxis(extent: readonly [number, number] | null): ValueAxis {
  const greatest = Math.max(extent?.[1] ?? 1, 0) || 1;
  const least = Math.min(extent?.[0] ?? 0, 0);
  const fine = tickStep(0, greatest - least, 2);
  const step = greatest - least > 2 * fine ? 2 * fine : fine;
  return axis(Math.floor(least / step) * step, Math.ceil(greatest / step) * step, step);
}

/** Round ticks over zero and both ends, in about four steps: for a panel that stands alone. */
export function fromZeroAxis(least: number, greatest: number): ValueAxis {
  const high = greatest > 0 || least < 0 ? Math.max(0, greatest) : 1;
  const low = Math.min(0, least);
  const step = tickStep(0, high - low, 4);
  return axis(Math.floor(low / step) * step, Math.ceil(high / step) * step, step);
}

/** Round ticks from zero to `greatest`, in about `count` steps. */
export function zeroAxis(greatest: number, count = 4): ValueAxis {
  const most = greatest > 0 ? greatest : 1;
  const step = tickStep(0, most, count);
  return axis(0, Math.ceil(most / step) * step, step);
}

function axis(low: number, high: number, step: number): ValueAxis {
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const count = Math.max(1, Math.round((high - low) / step));
  const ticks = Array.from({ length: count + 1 }, (_, index) =>
    Number((low + index * step).toFixed(decimals)),
  );
  return { low, high, ticks, decimals };
}

/** Pixel of a value on an axis drawn from `top` to `bottom`. */
export function pixelOf(value: number, { low, high }: ValueAxis, top: number, bottom: number) {
  return bottom - ((value - low) / (high - low)) * (bottom - top);
}
