import { DAY_MS, HOUR_MS } from "../../time/interval";
import { firstFrom } from "../corrections/correction-span";
import { medianOf } from "./read-rows";

export const LEAST_PAIRS = 30;
/** Residuals on each side of where two days' residuals meet. */
const EDGE_PAIRS = 12;
const AGREEING_SHARE = 0.75;
/** Flow must stay so for a day, less what a coarse logger leaves off at the end. */
const WHOLE_DAY_MS = 0.9 * DAY_MS;
/** Enough to see that most residuals say something else. */
const QUICK_PAIRS = 32;
const QUICK_SHARE = 0.65;

/** A channel's readings with the rows they stand in; flow as a logarithm. */
export interface Series {
  readonly rows: Uint32Array;
  readonly instantMs: Float64Array;
  readonly values: Float64Array;
}

export interface Step {
  readonly at: number;
  readonly size: number;
  readonly agreeing: number;
  readonly lagMs: number;
}

/** The step that the residuals across a change agree on; null where they do not. */
export function lasting(
  series: Series,
  change: number,
  jump: number,
  least: number,
  mayBeShort: boolean,
): Step | null {
  const { instantMs } = series;
  const atMs = instantMs[change]!;
  if (!mayLast(series, change, jump)) return null;
  const day = residuals(series, atMs, DAY_MS);
  const isDay = day.length >= LEAST_PAIRS;
  if (!mayBeShort && (!isDay || instantMs.at(-1)! - atMs < WHOLE_DAY_MS)) return null;
  const lagMs = isDay ? DAY_MS : Math.min(atMs - instantMs[0]!, instantMs.at(-1)! - atMs, DAY_MS);
  const across = isDay ? day : residuals(series, atMs, lagMs);
  if (across.length < LEAST_PAIRS) return null;
  const { usual, edge } = isDay ? neighbourDays(series, atMs, across) : NO_NEIGHBOURS;
  const size = medianOf(across.slice())! - usual;
  const ratio = size / jump;
  if (!(ratio >= 0.5 && ratio <= 2) || Math.abs(size) < least) return null;
  // A Monday's rise, taken off, would make a fall of its evening.
  if (Math.abs(usual) > Math.abs(size) / 2) return null;
  // Weather that changes within a day moves residuals too, but not from one to the next.
  if (edge !== null && !(edge / size >= 0.5 && edge / size <= 1.5)) return null;
  const agrees = (value: number) => (value - usual) / size >= 0.5 && (value - usual) / size <= 1.5;
  const share = across.filter(agrees).length / across.length;
  // Where two days' residuals meet, the weather has moved least.
  return share >= AGREEING_SHARE
    ? { at: change, size: edge ?? size, agreeing: share, lagMs }
    : null;
}

/** A quick look at some residuals across a change: whether most of them go its way. */
function mayLast({ instantMs, values }: Series, change: number, jump: number): boolean {
  const end = firstFrom(instantMs, instantMs[change]! + DAY_MS);
  const stride = Math.max(1, Math.floor((end - change) / QUICK_PAIRS));
  let along = 0;
  let looked = 0;
  for (let late = change; late < end; late += stride) {
    const early = firstFrom(instantMs, instantMs[late]! - DAY_MS);
    if (early >= change || instantMs[early]! > instantMs[late]! - DAY_MS + HOUR_MS) continue;
    looked++;
    if ((values[late]! - values[early]!) / jump > 0.25) along++;
  }
  return along >= QUICK_SHARE * looked;
}

const NO_NEIGHBOURS = { usual: 0, edge: null };

/**
 * The residuals of the day before a change, or else of the day after the first one: their median, which
 * is the weather's part, and how far they lie from the residuals across the change where they meet.
 */
function neighbourDays(series: Series, atMs: number, across: Float64Array) {
  const before = residuals(series, atMs - DAY_MS, DAY_MS);
  if (before.length >= LEAST_PAIRS) {
    const edge = medianOf(across.slice(0, EDGE_PAIRS))! - medianOf(before.slice(-EDGE_PAIRS))!;
    return { usual: medianOf(before)!, edge };
  }
  const after = residuals(series, atMs + DAY_MS, DAY_MS);
  if (after.length >= LEAST_PAIRS) {
    const edge = medianOf(across.slice(-EDGE_PAIRS))! - medianOf(after.slice(0, EDGE_PAIRS))!;
    return { usual: medianOf(after)!, edge };
  }
  return NO_NEIGHBOURS;
}

/** Readings of the `lagMs` from an instant on, less those `lagMs` earlier. */
function residuals({ instantMs, values }: Series, fromMs: number, lagMs: number): Float64Array {
  const found: number[] = [];
  let early = firstFrom(instantMs, fromMs - lagMs);
  for (let late = firstFrom(instantMs, fromMs); late < instantMs.length; late++) {
    const wanted = instantMs[late]! - lagMs;
    if (wanted >= fromMs) break;
    while (early < late && instantMs[early]! < wanted) early++;
    // A reading that is not there a day before, within half a step, has no residual.
    const before = late > 0 ? instantMs[late]! - instantMs[late - 1]! : Infinity;
    const after = late + 1 < instantMs.length ? instantMs[late + 1]! - instantMs[late]! : Infinity;
    const half = Math.min(before, after) / 2;
    for (const row of [early, early - 1]) {
      if (row < 0 || !(instantMs[row]! < fromMs)) continue;
      if (Math.abs(instantMs[row]! - wanted) > half) continue;
      found.push(values[late]! - values[row]!);
      break;
    }
  }
  return Float64Array.from(found);
}
