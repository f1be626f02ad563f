import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";
import { noFlowBelowM3PerHour, type NoFlowLimits } from "./no-flow";
import { readRows, rowWeightMs } from "./read-rows";
import { placeOf } from "./row-spans";
import { HOUR_MS } from "../../time/interval";

/**
 * Flow that is not 0 and yet too small to be told from none: |v| below the zero uncertainty, and not
 * below the cut-off the loop already has. Nothing is deleted: the choice is a cut-off for the loop, and
 * what it suppresses stays shown. Of more than 2 000 runs the first 2 000 are named; all are counted.
 *
 * Example: 0.12 m³/h at night in a bore of 102.26 mm (0.004 m/s, zero ±0.010 m/s) → those rows.
 */
export interface NoiseLimits extends NoFlowLimits {
  /** The loop's cut-off; null where it has none. */
  readonly flowCutOffM3PerHour: number | null;
}

export type NoFlowNoiseFinding = Finding<
  "noFlowNoise",
  {
    readonly hours: number;
    readonly meanM3PerHour: number;
    /** What would have moved had it been flow, m³, with its sign. */
    readonly volumeM3: number;
    readonly zeroUncertaintyM3PerHour: number;
  }
>;

/** Nothing is done row by row, so the first of them show where it is. */
const MOST_RANGES = 2000;

/** Null without a bore, without flow, or where nothing is found. */
export function noFlowNoise(
  segment: ReadingSegment,
  limits: NoiseLimits,
): NoFlowNoiseFinding | null {
  const flow = segment.columns.flowM3PerHour;
  const rows = readRows(segment, flow);
  if (!flow || !rows || limits.boreMm === null) return null;
  const below = noFlowBelowM3PerHour(limits);
  const cutOff = limits.flowCutOffM3PerHour ?? 0;
  const ranges: { from: number; to: number }[] = [];
  let rowCount = 0;
  let sum = 0;
  let hours = 0;
  let volumeM3 = 0;
  for (const row of rows) {
    const value = flow[row]!;
    const size = Math.abs(value);
    if (size >= below || size === 0 || size < cutOff) continue;
    rowCount++;
    const open = ranges.at(-1);
    if (open?.to === row) open.to = row + 1;
    else if (ranges.length < MOST_RANGES) ranges.push({ from: row, to: row + 1 });
    const rowHours = rowWeightMs(segment, row) / HOUR_MS;
    sum += value;
    hours += rowHours;
    volumeM3 += value * rowHours;
  }
  if (rowCount === 0) return null;
  return {
    code: "noFlowNoise",
    weight: "note",
    channel: "flowM3PerHour",
    ...placeOf(segment, ranges),
    rowCount,
    figures: {
      hours,
      meanM3PerHour: sum / rowCount,
      volumeM3,
      zeroUncertaintyM3PerHour: below,
    },
    choices: [{ change: "cutOff", flowM3PerHour: below }, KEEP],
  };
}
