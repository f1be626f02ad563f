import { HOUR_MS } from "../../time/interval";
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
}

const LEAST_K = 0.3;
const LEAST_FLOW_RATIO = 0.05;

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

function stepsOf(
  segment: ReadingSegment,
  channel: StepChannel,
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

function seriesOf(
  segment: ReadingSegment,
  channel: StepChannel,
  limits: StepLimits,
): Series | null {
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
  channel: StepChannel,
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
