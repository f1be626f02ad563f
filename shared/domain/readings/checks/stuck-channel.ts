import type { ReadingChannel, ReadingSegment } from "../reading-columns";
import type { RowRange } from "../corrections/correction-span";
import { KEEP, type Finding } from "./finding";
import { readRows } from "./read-rows";
import { placeOf } from "./row-spans";

/**
 * A channel that stands still while the load moves: at least 30 identical readings in a row while a
 * companion varies by more than 10 %.
 *
 * A companion's variation is the range of its readings in the run without the one highest and the one
 * lowest (a single spike moves nothing), put to their mean size for flow and power. A temperature has
 * no natural zero: its range is put to the loop's ΔT, the design's or, where that is unknown, the mean
 * of the run, at least 1 K. Companions are the other channels of flow, supply, return and power. Rows without a reading are passed
 * over. A flow of exactly 0 is a pump that stands, not a channel that does.
 *
 * Example: 36 times 7.42 °C while flow goes from 24 to 36 m³/h (37 %) → these 36 rows.
 */
export interface StuckLimits {
  readonly designDeltaTK: number | null;
  /** 30 unless given. */
  readonly leastReadings?: number;
  /** 0.1 unless given. */
  readonly companionVariation?: number;
}

export const STUCK_READINGS = 30;
export const STUCK_COMPANION_VARIATION = 0.1;
const LEAST_DELTA_T_K = 1;

const CHANNELS = ["flowM3PerHour", "supplyC", "returnC", "powerKw"] as const;
type Channel = (typeof CHANNELS)[number] & ReadingChannel;

export type StuckFinding = Finding<
  "stuckChannel",
  {
    readonly runs: number;
    /** Of the longest run: its value in the channel's unit and its number of readings. */
    readonly value: number;
    readonly readings: number;
    /** What moved meanwhile, and by how much, percent. */
    readonly companion: Channel;
    readonly companionVariationPercent: number;
  }
>;

interface StuckRun extends RowRange {
  readonly value: number;
  readonly readings: number;
  readonly companion: Channel;
  readonly variation: number;
}

/** At most one finding a channel, with all its runs. */
export function stuckChannels(segment: ReadingSegment, limits: StuckLimits): StuckFinding[] {
  return CHANNELS.flatMap((channel) => {
    const runs = stuckRuns(segment, channel, limits);
    const [first] = runs;
    if (!first) return [];
    const longest = runs.reduce((a, b) => (b.readings > a.readings ? b : a), first);
    const place = placeOf(
      segment,
      runs.map(({ from, to }) => ({ from, to })),
    );
    return [
      {
        code: "stuckChannel",
        weight: "look",
        channel,
        ...place,
        figures: {
          runs: runs.length,
          value: longest.value,
          readings: longest.readings,
          companion: longest.companion,
          companionVariationPercent: longest.variation * 100,
        },
        choices: [{ change: "exclude", spans: place.spans }, KEEP],
      } satisfies StuckFinding,
    ];
  });
}

function stuckRuns(segment: ReadingSegment, channel: Channel, limits: StuckLimits): StuckRun[] {
  const values = segment.columns[channel];
  const rows = readRows(segment, values);
  if (!values || !rows) return [];
  const least = limits.leastReadings ?? STUCK_READINGS;
  const threshold = limits.companionVariation ?? STUCK_COMPANION_VARIATION;
  const runs: StuckRun[] = [];
  let start = 0;
  for (let at = 1; at <= rows.length; at++) {
    const value = values[rows[start]!]!;
    if (at < rows.length && values[rows[at]!]! === value) continue;
    const readings = at - start;
    if (readings >= least && !(channel === "flowM3PerHour" && value === 0)) {
      const run = rows.subarray(start, at);
      const moved = mostMoved(segment, channel, run, limits.designDeltaTK);
      if (moved && moved.variation > threshold)
        runs.push({ from: run[0]!, to: run[readings - 1]! + 1, value, readings, ...moved });
    }
    start = at;
  }
  return runs;
}

function mostMoved(
  segment: ReadingSegment,
  stuck: Channel,
  run: Uint32Array,
  designDeltaTK: number | null,
): { readonly companion: Channel; readonly variation: number } | null {
  const { supplyC, returnC } = segment.columns;
  let most: { readonly companion: Channel; readonly variation: number } | null = null;
  for (const companion of CHANNELS) {
    const values = segment.columns[companion];
    if (companion === stuck || !values) continue;
    const { range, meanSize } = spread(values, run);
    const isTemperature = companion === "supplyC" || companion === "returnC";
    const scale = isTemperature
      ? (designDeltaTK ?? Math.max(LEAST_DELTA_T_K, meanDeltaTK(supplyC, returnC, run)))
      : meanSize;
    const variation = scale > 0 ? range / scale : 0;
    if (most === null || variation > most.variation) most = { companion, variation };
  }
  return most;
}

/** Second highest minus second lowest reading, and the mean of their sizes; both 0 of fewer than 4. */
function spread(values: Float64Array, run: Uint32Array) {
  let low = Infinity;
  let secondLow = Infinity;
  let high = -Infinity;
  let secondHigh = -Infinity;
  let sum = 0;
  let count = 0;
  for (const row of run) {
    const value = values[row]!;
    if (value !== value) continue;
    count++;
    sum += Math.abs(value);
    if (value < low) [secondLow, low] = [low, value];
    else if (value < secondLow) secondLow = value;
    if (value > high) [secondHigh, high] = [high, value];
    else if (value > secondHigh) secondHigh = value;
  }
  return count < 4
    ? { range: 0, meanSize: 0 }
    : { range: secondHigh - secondLow, meanSize: sum / count };
}

function meanDeltaTK(
  supplyC: Float64Array | null,
  returnC: Float64Array | null,
  run: Uint32Array,
): number {
  if (!supplyC || !returnC) return 0;
  let sum = 0;
  let count = 0;
  for (const row of run) {
    const deltaTK = Math.abs(supplyC[row]! - returnC[row]!);
    if (deltaTK !== deltaTK) continue;
    sum += deltaTK;
    count++;
  }
  return count > 0 ? sum / count : 0;
}
