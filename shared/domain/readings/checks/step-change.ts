import { DAY_MS, HOUR_MS } from "../../time/interval";
import { firstFrom } from "../corrections/correction-span";
import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";
import { noFlowBelowM3PerHour, type NoFlowLimits } from "./no-flow";
import { medianOf, readRows } from "./read-rows";
import { placeOf } from "./row-spans";

/**
 * A step that the water did not make: from one reading to the next a channel sits higher or lower for
 * good, and nothing else answers. A probe strapped on again does that, and a setting that was changed.
 *
 * The residual is the reading less the one a day before, so that the day's own shape falls out of it;
 * where the series is shorter than that, the longest shift that fits. Flow, which jumps
 * with the load too, needs a day after the change. A change point needs all of:
 * 1. a jump at once: the median of 5 readings from there on against the 5 before it, less the drift on
 *    both sides, at least 0.3 K for a temperature and 5 % for a flow, more than that drift bends, and
 *    twice the scatter there;
 * 2. no answer: the other temperature moves by less than 0.3 of the jump, flow by less than 5 %; when
 *    flow jumps, neither temperature moves by 0.3 of what that flow would do to ΔT (at least 0.15 K);
 * 3. a lasting one: the residuals that reach across it, at least 30, less the median of those wholly
 *    before it (or after, or 0 where there is no such day): three quarters lie between half and one and
 *    a half times their median, which has the jump's sign and half to twice its size; and where they
 *    meet the next day's, 12 on each side differ by half to one and a half times as much.
 * Flow is compared by ratio and only where it flows, since a wrong setting multiplies. The row is the
 * one that splits its neighbours with the least sum of distances from their medians.
 *
 * The proposal is to split there, never to average across. The bounds are our own, chosen so that
 * starts, set-backs and weekends, which other channels or the next day contradict, are not steps.
 *
 * Example: return 12.8 °C until Tuesday 10:00 and 13.9 °C from then on, at the same flow and supply →
 * a step of 1.1 K at 10:00.
 */
export interface StepLimits extends NoFlowLimits {
  /** K; 0.3 unless given. */
  readonly leastK?: number;
  /** Ratio less 1; 0.05 unless given. */
  readonly leastFlowRatio?: number;
}

const SIDE = 5;
const MIDDLE = 2;
const LEAST_K = 0.3;
const LEAST_FLOW_RATIO = 0.05;
const LEAST_PAIRS = 30;
/** Residuals on each side of where two days' residuals meet. */
const EDGE_PAIRS = 12;
const AGREEING_SHARE = 0.75;
/** Flow must stay so for a day, less what a coarse logger leaves off at the end. */
const WHOLE_DAY_MS = 0.9 * DAY_MS;
const ANSWER_SHARE = 0.3;
const FLOW_ANSWER = 0.05;
const LEAST_ANSWER_K = 0.15;
/** Enough to see that most residuals say something else. */
const QUICK_PAIRS = 32;
const QUICK_SHARE = 0.65;

type Channel = "flowM3PerHour" | "supplyC" | "returnC";

export type StepChangeFinding = Finding<
  "stepChange",
  {
    readonly atMs: number;
    /** K for a temperature, percent for flow; with its sign. */
    readonly step: number;
    /** Medians of the 5 readings before and after, °C or m³/h. */
    readonly before: number;
    readonly after: number;
    /** Residuals that agree with the step, of those that reach across it. */
    readonly agreeingPercent: number;
    readonly comparedHours: number;
  }
>;

/** One finding a change point; its row is the first one after the change. */
export function stepChanges(segment: ReadingSegment, limits: StepLimits): StepChangeFinding[] {
  return (["flowM3PerHour", "supplyC", "returnC"] as const).flatMap((channel) =>
    stepsOf(segment, channel, limits),
  );
}

/** A channel's readings with the rows they stand in; flow as a logarithm. */
interface Series {
  readonly rows: Uint32Array;
  readonly instantMs: Float64Array;
  readonly values: Float64Array;
}

interface Step {
  readonly at: number;
  readonly size: number;
  readonly agreeing: number;
  readonly lagMs: number;
}

function stepsOf(
  segment: ReadingSegment,
  channel: Channel,
  limits: StepLimits,
): StepChangeFinding[] {
  const held = segment.columns[channel];
  const series = seriesOf(segment, channel, limits);
  if (!held || !series || series.rows.length < 2 * LEAST_PAIRS) return [];
  const isFlow = channel === "flowM3PerHour";
  const least = isFlow
    ? Math.log1p(limits.leastFlowRatio ?? LEAST_FLOW_RATIO)
    : (limits.leastK ?? LEAST_K);
  return findSteps(segment, channel, series, least).map(({ at, size, agreeing, lagMs }) => {
    const row = series.rows[at]!;
    const atMs = series.instantMs[at]!;
    const median = (from: number) =>
      medianOf(Float64Array.from(series.rows.subarray(from, from + SIDE), (r) => held[r]!))!;
    return {
      code: "stepChange",
      weight: "look",
      channel,
      ...placeOf(segment, [{ from: row, to: row + 1 }]),
      figures: {
        atMs,
        step: isFlow ? Math.expm1(size) * 100 : size,
        before: median(at - SIDE),
        after: median(at),
        agreeingPercent: agreeing * 100,
        comparedHours: lagMs / HOUR_MS,
      },
      choices: [{ change: "split", atMs }, KEEP],
    };
  });
}

function seriesOf(segment: ReadingSegment, channel: Channel, limits: StepLimits): Series | null {
  const held = segment.columns[channel];
  let rows = readRows(segment, held);
  if (!held || !rows) return null;
  const isFlow = channel === "flowM3PerHour";
  if (isFlow) {
    const noFlow = noFlowBelowM3PerHour(limits);
    rows = rows.filter((row) => Math.abs(held[row]!) > noFlow);
  }
  const instantMs = new Float64Array(rows.length);
  const values = new Float64Array(rows.length);
  for (let at = 0; at < rows.length; at++) {
    const row = rows[at]!;
    instantMs[at] = segment.columns.instantMs[row]!;
    values[at] = isFlow ? Math.log(Math.abs(held[row]!)) : held[row]!;
  }
  return { rows, instantMs, values };
}

function findSteps(
  segment: ReadingSegment,
  channel: Channel,
  series: Series,
  least: number,
): Step[] {
  const { values, instantMs, rows } = series;
  const count = values.length;
  const widestMs = Math.max(HOUR_MS, 4 * SIDE * segment.nominalStepMs);
  const jumps = new Jumps(instantMs, values);
  const steps: Step[] = [];
  for (let at = SIDE; at <= count - SIDE; at++) {
    if (jumps.isCalm(at, least / 2)) continue;
    const first = jumps.at(at);
    if (Math.abs(first) < least) continue;
    // The same change shows from a few rows before it to a few after: look at it once.
    let end = at;
    while (end < count - SIDE && end - at < SIDE && jumps.at(end + 1) * Math.sign(first) >= least)
      end++;
    const middle = (at + end) >> 1;
    if (jumps.scatterAt(middle) > Math.abs(jumps.at(middle)) / 2) {
      at = end;
      continue;
    }
    const change = jumps.sharpest(at, end);
    at = end;
    if (instantMs[change + SIDE - 1]! - instantMs[change - SIDE]! > widestMs) continue;
    const jump = jumps.at(change);
    if (Math.abs(jump) < Math.max(least, jumps.bendAt(change))) continue;
    if (answers(segment, channel, rows[change]!, jump)) continue;
    const step = lasting(series, change, jump, least, channel !== "flowM3PerHour");
    if (step !== null) steps.push(step);
  }
  return steps;
}

/** How a series jumps at its rows, from medians of 5 and beyond what it drifts on both sides. */
class Jumps {
  private readonly medians: Float64Array;

  constructor(
    private readonly instantMs: Float64Array,
    private readonly values: Float64Array,
  ) {
    this.medians = mediansOfFive(values);
  }

  at(row: number): number {
    const [before, after] = this.drifts(row, row);
    return this.plain(row) - ((before + after) / 2) * this.betweenMs(row);
  }

  /** Nearly every row leaves here, without a look at the drift. */
  isCalm(row: number, least: number): boolean {
    return Math.abs(this.medians[row]! - this.medians[row - SIDE]!) < least;
  }

  /** Mean distance of the 5 before a row and the 5 from it on from their medians. */
  scatterAt(row: number): number {
    let distance = 0;
    for (let i = row - SIDE; i < row + SIDE; i++)
      distance += Math.abs(this.values[i]! - this.medians[i < row ? row - SIDE : row]!);
    return distance / (2 * SIDE);
  }

  /** How much the drift changes at a row: a bend as large as the jump is no step. */
  bendAt(row: number): number {
    const [before, after] = this.drifts(row, row);
    return Math.abs(after - before) * this.betweenMs(row);
  }

  /** The row from `from` to `to` that best parts the rows round it into two levels, drift apart. */
  sharpest(from: number, to: number): number {
    const [before, after] = this.drifts(from, to);
    const startMs = this.instantMs[from]!;
    const level = new Float64Array(SIDE);
    let best = from;
    let bestDistance = Infinity;
    for (let at = from; at <= to; at++) {
      let distance = 0;
      for (const start of [at - SIDE, at]) {
        for (let i = 0; i < SIDE; i++) {
          const sinceMs = this.instantMs[start + i]! - startMs;
          level[i] = this.values[start + i]! - ((before + after) / 2) * sinceMs;
        }
        level.sort();
        distance += level[4]! + level[3]! - level[1]! - level[0]!;
      }
      if (distance < bestDistance) [best, bestDistance] = [at, distance];
    }
    return best;
  }

  private plain(row: number): number {
    return this.medians[row]! - this.medians[row - SIDE]!;
  }

  /** Between the middle reading of the 5 before a row and that of the 5 from it on. */
  private betweenMs(row: number): number {
    return this.instantMs[row + MIDDLE]! - this.instantMs[row - SIDE + MIDDLE]!;
  }

  /** Drift a millisecond before one row and from another on; at an end, that of the other side. */
  private drifts(before: number, after: number): readonly [number, number] {
    const hasBefore = before >= 2 * SIDE;
    const hasAfter = after + 2 * SIDE <= this.values.length;
    const rate = (row: number) => this.plain(row) / this.betweenMs(row);
    const one = hasBefore ? rate(before - SIDE) : null;
    const other = hasAfter ? rate(after + SIDE) : null;
    return [one ?? other ?? 0, other ?? one ?? 0];
  }
}

/** Whether another channel moved as water would make it move. */
function answers(segment: ReadingSegment, channel: Channel, row: number, jump: number): boolean {
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
  const level = (from: number) => {
    const known = values
      .slice(Math.max(0, from), Math.max(0, from + SIDE))
      .filter((value) => !Number.isNaN(value));
    return known.length < 3 ? null : medianOf(known)!;
  };
  const before = level(row - SIDE);
  const after = level(row);
  if (before === null || after === null) return null;
  const { instantMs } = columns;
  const last = instantMs.length - 1;
  const middleMs = (from: number) => instantMs[Math.min(last, Math.max(0, from) + MIDDLE)]!;
  const rate = (from: number, change: number) =>
    change === 0 ? 0 : change / (middleMs(from + SIDE) - middleMs(from));
  const earlier = level(row - 2 * SIDE) ?? before;
  const later = level(row + SIDE) ?? after;
  const drift = (rate(row - 2 * SIDE, before - earlier) + rate(row, later - after)) / 2;
  const betweenMs = middleMs(row) - middleMs(row - SIDE);
  return { before, after, moved: Math.abs(after - before - drift * betweenMs) };
}

/** The step that the residuals across a change agree on; null where they do not. */
function lasting(
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
    const isNear = (row: number) =>
      row >= 0 && instantMs[row]! < fromMs && Math.abs(instantMs[row]! - wanted) <= half;
    if (isNear(early)) found.push(values[late]! - values[early]!);
    else if (isNear(early - 1)) found.push(values[late]! - values[early - 1]!);
  }
  return Float64Array.from(found);
}

/** Median of each value and the four after it. */
function mediansOfFive(values: Float64Array): Float64Array {
  const medians = new Float64Array(Math.max(0, values.length - SIDE + 1));
  for (let i = 0; i < medians.length; i++)
    medians[i] = medianOfFive(
      values[i]!,
      values[i + 1]!,
      values[i + 2]!,
      values[i + 3]!,
      values[i + 4]!,
    );
  return medians;
}

/** By leaving out what cannot be the middle: the lower of two pairs' lows, the higher of their highs. */
function medianOfFive(a: number, b: number, c: number, d: number, e: number): number {
  const low = Math.max(Math.min(a, b), Math.min(c, d));
  const high = Math.min(Math.max(a, b), Math.max(c, d));
  return Math.max(Math.min(low, high), Math.min(Math.max(low, high), e));
}
