import { DAY_MS, HOUR_MS } from "../../time/interval";
import { firstFrom, type RowRange } from "../corrections/correction-span";
import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";
import { noFlowBelowM3PerHour, type NoFlowLimits } from "./no-flow";
import { medianOf, readRows } from "./read-rows";
import { placeOf } from "./row-spans";
import { answers, type StepChannel } from "./step-answers";
import { Jumps, SIDE } from "./step-jumps";
import { lasting, LEAST_PAIRS, type Series, type Step } from "./step-residuals";

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
  /** Called before each stretch of rows; may throw to stop the work. */
  readonly onStep?: () => void;
}

const LEAST_K = 0.3;
const LEAST_FLOW_RATIO = 0.05;
/**
 * Rows looked through at a time, so that memory stays flat and somebody who cancels is heard; more where
 * the margins would be most of the work. What is found does not depend on it.
 */
const ROWS_AT_ONCE = 50_000;
/** Residuals are taken from as far as two days on either side of a change, drift from 15 readings. */
const MARGIN_MS = 2 * DAY_MS + HOUR_MS;
const MARGIN_READINGS = 4 * SIDE;

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

/**
 * One finding a change point; its row is the first one after the change.
 * @param rowsAtOnce how many rows are looked through at a time
 */
export function stepChanges(
  segment: ReadingSegment,
  limits: StepLimits,
  rowsAtOnce = ROWS_AT_ONCE,
): StepChangeFinding[] {
  const { instantMs } = segment.columns;
  return (["flowM3PerHour", "supplyC", "returnC"] as const).flatMap((channel) => {
    const found: StepChangeFinding[] = [];
    const window = { from: 0, to: 0, lookFrom: 0 };
    while (window.to < instantMs.length) {
      limits.onStep?.();
      window.from = window.to;
      const wideMs = instantMs[window.from]! + 2 * MARGIN_MS;
      const wide = Math.max(window.from + rowsAtOnce, firstFrom(instantMs, wideMs));
      window.to = Math.min(instantMs.length, wide);
      found.push(...stepsOf(segment, channel, limits, window));
    }
    return found;
  });
}

/** Rows in which changes are looked for, and the first one that the window before has not settled. */
interface Window extends RowRange {
  lookFrom: number;
}

function stepsOf(
  segment: ReadingSegment,
  channel: StepChannel,
  limits: StepLimits,
  window: Window,
): StepChangeFinding[] {
  const held = segment.columns[channel];
  const series = seriesOf(segment, channel, limits, window);
  if (!held || !series || series.rows.length < 2 * LEAST_PAIRS) return [];
  const isFlow = channel === "flowM3PerHour";
  const least = isFlow
    ? Math.log1p(limits.leastFlowRatio ?? LEAST_FLOW_RATIO)
    : (limits.leastK ?? LEAST_K);
  return findSteps(segment, channel, series, least, window).map(({ at, size, agreeing, lagMs }) => {
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

function seriesOf(
  segment: ReadingSegment,
  channel: StepChannel,
  limits: StepLimits,
  window: RowRange,
): Series | null {
  const held = segment.columns[channel];
  if (!held) return null;
  const isFlow = channel === "flowM3PerHour";
  const noFlow = noFlowBelowM3PerHour(limits);
  const rows = rowsRound(segment.columns.instantMs, window, (range) => {
    const readable = readRows(segment, held, range) ?? new Uint32Array(0);
    return isFlow ? readable.filter((row) => Math.abs(held[row]!) > noFlow) : readable;
  });
  const instantMs = new Float64Array(rows.length);
  const values = new Float64Array(rows.length);
  for (let at = 0; at < rows.length; at++) {
    const row = rows[at]!;
    instantMs[at] = segment.columns.instantMs[row]!;
    values[at] = isFlow ? Math.log(Math.abs(held[row]!)) : held[row]!;
  }
  return { rows, instantMs, values };
}

/** The readable rows of a window and of what a change inside it is judged by on either side. */
function rowsRound(
  instantMs: Float64Array,
  { from, to }: RowRange,
  readable: (range: RowRange) => Uint32Array,
): Uint32Array {
  const last = instantMs.length - 1;
  let before = from - firstFrom(instantMs, instantMs[from]! - MARGIN_MS) + MARGIN_READINGS;
  let after =
    firstFrom(instantMs, instantMs[Math.min(to, last)]! + MARGIN_MS) - to + MARGIN_READINGS;
  for (;;) {
    const range = { from: Math.max(0, from - before), to: Math.min(last + 1, to + after) };
    const rows = readable(range);
    // A pump that stood still leaves stretches without any reading.
    const lacksBefore = range.from > 0 && firstFrom(rows, from) < MARGIN_READINGS;
    const lacksAfter = range.to <= last && rows.length - firstFrom(rows, to) < MARGIN_READINGS;
    if (!lacksBefore && !lacksAfter) return rows;
    if (lacksBefore) before *= 4;
    if (lacksAfter) after *= 4;
  }
}

function findSteps(
  segment: ReadingSegment,
  channel: StepChannel,
  series: Series,
  least: number,
  window: Window,
): Step[] {
  const { values, instantMs, rows } = series;
  const count = values.length;
  const widestMs = Math.max(HOUR_MS, 4 * SIDE * segment.nominalStepMs);
  const jumps = new Jumps(instantMs, values);
  const steps: Step[] = [];
  let at = Math.max(SIDE, firstFrom(rows, Math.max(window.from, window.lookFrom)));
  for (; at <= count - SIDE && rows[at]! < window.to; at++) {
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
  // A change near the end was looked at whole, so the next window begins after it.
  window.lookFrom = rows[at] ?? window.to;
  return steps;
}
