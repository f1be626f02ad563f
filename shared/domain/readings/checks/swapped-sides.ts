import type { LoopService } from "../../energy/power";
import { HOUR_MS, MINUTE_MS } from "../../time/interval";
import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";
import { noFlowBelowM3PerHour, type NoFlowLimits } from "./no-flow";
import { medianOf, readRows, rowWeightMs, sampleOf } from "./read-rows";
import { wholePlace } from "./row-spans";

/**
 * Supply and return the wrong way round: for more than 90 % of the time with flow, ΔT (supply minus
 * return) has the sign that the loop's service cannot give. A ΔT within the dead band has no sign and
 * counts as time without a wrong one. Sides are changed for the whole series or not at all, never row
 * by row.
 *
 * What happens when the pump stands tells a swap from a probe that reads wrong: both pipes drift to the
 * room, so that two good probes come together. In stops of at least 30 minutes the ΔT of the last
 * quarter is taken; if the median of their sizes is at most half of the size with flow, they do. If they
 * stay apart, the sign may be an offset of the pair, and the finding asks to look instead of stopping.
 *
 * A loop that changes over has no sign of its own and is left alone, as is a series without flow.
 *
 * Example: a chilled loop logged as 12 °C supply, 6 °C return all day → share 100 %, ΔT +6 K.
 */
export interface SwappedLimits extends NoFlowLimits {
  readonly service: LoopService;
  /** K, 0.2 unless given. */
  readonly deadBandK?: number;
}

export const WRONG_SIGN_SHARE = 0.9;
const DEAD_BAND_K = 0.2;
const MOST_SAMPLES = 4001;
const LEAST_STOP_MS = 30 * MINUTE_MS;

export type SwappedSidesFinding = Finding<
  "swappedSides",
  {
    readonly wrongSharePercent: number;
    readonly flowingHours: number;
    /** Median with flow, supply minus return, of at most 4 001 readings. */
    readonly deltaTK: number;
    /** Median size at the end of stops; null where the pump never stood long enough. */
    readonly standingDeltaTK: number | null;
    readonly standing: "comesTogether" | "staysApart" | "noStop";
  }
>;

export function swappedSides(
  segment: ReadingSegment,
  limits: SwappedLimits,
): SwappedSidesFinding | null {
  const { flowM3PerHour, supplyC, returnC } = segment.columns;
  if (limits.service === "changeover" || !flowM3PerHour || !supplyC || !returnC) return null;
  const rows = readRows(segment, flowM3PerHour)!;
  const wrongSign = limits.service === "heating" ? -1 : 1;
  const deadBandK = limits.deadBandK ?? DEAD_BAND_K;
  const noFlow = noFlowBelowM3PerHour(limits);
  const flowing = new Uint32Array(rows.length);
  let count = 0;
  let flowingMs = 0;
  let wrongMs = 0;
  for (const row of rows) {
    const deltaTK = supplyC[row]! - returnC[row]!;
    if (deltaTK !== deltaTK || Math.abs(flowM3PerHour[row]!) <= noFlow) continue;
    const weight = rowWeightMs(segment, row);
    flowingMs += weight;
    if (deltaTK * wrongSign > deadBandK) wrongMs += weight;
    flowing[count++] = row;
  }
  if (flowingMs === 0 || wrongMs <= WRONG_SIGN_SHARE * flowingMs) return null;
  const sample = sampleOf(flowing.subarray(0, count), MOST_SAMPLES);
  const deltaTK = medianOf(Float64Array.from(sample, (row) => supplyC[row]! - returnC[row]!))!;
  const standingDeltaTK = standingDelta(segment, rows, noFlow);
  const standing =
    standingDeltaTK === null
      ? "noStop"
      : standingDeltaTK <= Math.abs(deltaTK) / 2
        ? "comesTogether"
        : "staysApart";
  const place = wholePlace(segment);
  const span = place.spans[0]!;
  return {
    code: "swappedSides",
    weight: standing === "staysApart" ? "look" : "stop",
    channel: null,
    ...place,
    figures: {
      wrongSharePercent: (wrongMs / flowingMs) * 100,
      flowingHours: flowingMs / HOUR_MS,
      deltaTK,
      standingDeltaTK,
      standing,
    },
    choices: [
      { change: "swapSides", span, swapped: "probes" },
      { change: "swapSides", span, swapped: "channels" },
      KEEP,
    ],
  };
}

/** Median over stops of the size of the median ΔT in each stop's last quarter, K. */
function standingDelta(segment: ReadingSegment, rows: Uint32Array, noFlow: number): number | null {
  const { instantMs, flowM3PerHour, supplyC, returnC } = segment.columns;
  const settled: number[] = [];
  let start = -1;
  for (let at = 0; at <= rows.length; at++) {
    const stands = at < rows.length && Math.abs(flowM3PerHour![rows[at]!]!) <= noFlow;
    if (stands && start < 0) start = at;
    if (stands || start < 0) continue;
    const startMs = instantMs[rows[start]!]!;
    const endMs = instantMs[rows[at - 1]!]!;
    if (endMs - startMs >= LEAST_STOP_MS) {
      const last = rows
        .subarray(start, at)
        .filter((row) => instantMs[row]! >= endMs - (endMs - startMs) / 4);
      const deltas = Float64Array.from(last, (row) => supplyC![row]! - returnC![row]!);
      const median = medianOf(deltas.filter((deltaTK) => !Number.isNaN(deltaTK)));
      if (median !== null) settled.push(Math.abs(median));
    }
    start = -1;
  }
  return medianOf(Float64Array.from(settled));
}
