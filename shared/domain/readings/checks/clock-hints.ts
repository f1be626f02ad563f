import { MINUTE_MS } from "../../time/interval";
import { nominalStepMs } from "../nominal-step";
import { firstFrom } from "../corrections/correction-span";
import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";
import { medianOf, sampleOf } from "./read-rows";
import { wholePlace } from "./row-spans";

/** Readings of one logger, instants ascending. NaN is no reading. */
export interface EdgeSeries {
  readonly instantMs: Float64Array;
  readonly values: Float64Array;
}

/**
 * Whether two loggers' clocks agree, from what both saw: where flow jumps, temperatures move.
 *
 * Edges of flow are changes from one reading to the next of at least a quarter of its spread (5th to
 * 95th percentile); at most 400 of them, from across the series. Round each, up to 130 minutes either
 * way, the changes of temperature are averaged by how much later they came, in steps of the coarser
 * logger. The lag is where the average is highest; it counts if it is at least three times the median
 * of all lags. An edge tells something if the largest change round it is six times the median one
 * there: a pump that stops leaves pipes to drift. At least 5 edges must tell something, and 60 % of
 * those lie within one step of the lag. Water takes its time to carry heat, so a lag below 10 minutes or 3
 * steps says nothing.
 *
 * It is a hint and no more: it names no correction, because a long pipe lags too. The notes taken at
 * start and end tell the clock.
 *
 * Example: a pump that starts each day at 6:00 by one logger and temperatures that move at 7:00 by the
 * other → +60 min.
 */
export interface ClockLag {
  /** Temperatures come this much later than flow; negative where they come first. */
  readonly lagMs: number;
  /** Edges of flow that tell something. */
  readonly edges: number;
  /** Share of those that agree, 0 to 1. */
  readonly agreeing: number;
}

const WIDEST_MS = 130 * MINUTE_MS;
const LEAST_LAG_MS = 10 * MINUTE_MS;
const LEAST_LAG_STEPS = 3;
const LEAST_EDGES = 5;
const MOST_EDGES = 400;
const MOST_SAMPLES = 4001;
const EDGE_SHARE = 0.25;
const CLEAR_OF_MEDIAN = 3;
const CLEAR_OF_USUAL = 6;
const AGREEING_SHARE = 0.6;

/** The lag between two loggers' edges; null where nothing tells. Zero is an answer. */
export function clockLag(flow: EdgeSeries, temperature: EdgeSeries): ClockLag | null {
  const edges = flowEdges(flow);
  const step = Math.max(
    nominalStepMs(flow.instantMs) ?? 0,
    nominalStepMs(temperature.instantMs) ?? 0,
  );
  if (edges.length < LEAST_EDGES || step <= 0) return null;
  const reach = Math.floor(WIDEST_MS / step);
  if (reach < LEAST_LAG_STEPS) return null;
  const sum = new Float64Array(2 * reach + 1);
  const count = new Float64Array(2 * reach + 1);
  const largestLag: number[] = [];
  const { instantMs, values } = temperature;
  for (const edgeMs of edges) {
    let largest = 0;
    let lagOfLargest = NaN;
    const changes: number[] = [];
    for (let j = Math.max(1, firstFrom(instantMs, edgeMs - (reach + 0.5) * step)); ; j++) {
      const lag = Math.round((instantMs[j]! - edgeMs) / step);
      if (j >= instantMs.length || lag > reach) break;
      const change = Math.abs(values[j]! - values[j - 1]!);
      if (change !== change || instantMs[j]! - instantMs[j - 1]! > 3 * step || lag < -reach)
        continue;
      sum[lag + reach] = sum[lag + reach]! + change;
      count[lag + reach] = count[lag + reach]! + 1;
      changes.push(change);
      if (change > largest) [largest, lagOfLargest] = [change, lag];
    }
    const usual = medianOf(Float64Array.from(changes)) ?? 0;
    if (largest > 0 && largest >= CLEAR_OF_USUAL * usual) largestLag.push(lagOfLargest);
  }
  const means = sum.map((total, i) => (count[i]! > 0 ? total / count[i]! : 0));
  const best = means.indexOf(means.reduce((a, b) => Math.max(a, b), 0));
  const lag = best - reach;
  const background = medianOf(means.slice())!;
  const near = largestLag.filter((other) => Math.abs(other - lag) <= 1).length;
  const agreeing = near / largestLag.length;
  const isClear = means[best]! > 0 && means[best]! >= CLEAR_OF_MEDIAN * background;
  const tells = largestLag.length >= LEAST_EDGES && agreeing >= AGREEING_SHARE;
  if (!isClear || !tells) return null;
  return { lagMs: lag * step, edges: largestLag.length, agreeing };
}

export type ClockHintFinding = Finding<
  "clockHint",
  { readonly lagMinutes: number; readonly edges: number; readonly agreeingPercent: number }
>;

/** For flow and temperatures that came from two loggers: says where their edges lie apart. */
export function clockHint(segment: ReadingSegment): ClockHintFinding | null {
  const { instantMs, flowM3PerHour, supplyC, returnC } = segment.columns;
  if (!flowM3PerHour || instantMs.length === 0) return null;
  const lags = [supplyC, returnC].flatMap((values) => {
    const lag = values && clockLag({ instantMs, values: flowM3PerHour }, { instantMs, values });
    return lag ? [lag] : [];
  });
  // The nearer pipe answers first: what it says is closest to the clock.
  const lag = lags.reduce<ClockLag | null>(
    (least, other) =>
      least === null || Math.abs(other.lagMs) < Math.abs(least.lagMs) ? other : least,
    null,
  );
  const least = Math.max(LEAST_LAG_MS, LEAST_LAG_STEPS * segment.nominalStepMs);
  if (lag === null || Math.abs(lag.lagMs) < least) return null;
  return {
    code: "clockHint",
    weight: "note",
    channel: null,
    ...wholePlace(segment),
    figures: {
      lagMinutes: lag.lagMs / MINUTE_MS,
      edges: lag.edges,
      agreeingPercent: lag.agreeing * 100,
    },
    choices: [KEEP],
  };
}

/** Instants at which flow jumps. */
function flowEdges({ instantMs, values }: EdgeSeries): number[] {
  const stride = Math.ceil(values.length / MOST_SAMPLES);
  const sample: number[] = [];
  for (let row = 0; row < values.length; row += stride)
    if (!Number.isNaN(values[row]!)) sample.push(values[row]!);
  if (sample.length < 2) return [];
  const sorted = Float64Array.from(sample).sort();
  const at = (share: number) => sorted[Math.round(share * (sorted.length - 1))]!;
  const least = EDGE_SHARE * (at(0.95) - at(0.05));
  if (!(least > 0)) return [];
  const rows: number[] = [];
  for (let row = 1; row < values.length; row++)
    if (Math.abs(values[row]! - values[row - 1]!) >= least) rows.push(row);
  return Array.from(sampleOf(Uint32Array.from(rows), MOST_EDGES), (row) => instantMs[row]!);
}
