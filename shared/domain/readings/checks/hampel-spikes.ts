import { MINUTE_MS } from "../../time/interval";
import { velocityMPerS } from "../../pipes/bore";
import type { ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";
import { readRows } from "./read-rows";
import { placeOf, rangesOfRows } from "./row-spans";

/**
 * Spikes: readings that stand out of their neighbours and that water cannot have followed. Both are
 * needed, because a pump that starts stands out too.
 *
 * Standing out: further than 6·1.4826·MAD from the median of the 15 readings round it, MAD being the
 * median of their distances from that median (Hampel 1974; 1.4826 makes MAD a standard deviation of
 * normal noise). At the ends of the series the 15 nearest readings are taken; fewer than 15 prove
 * nothing. Physically: for flow a water speed over 5 m/s in this bore; for a temperature a jump there
 * and a jump back, each faster than `maxKPerMinute` from one reading to the next. Such a spike is at
 * at least half the jump at the limit away, at most 7 readings long, since 8 of 15 would be the median themselves, and not at an end of the series.
 *
 * Without a bore flow is not checked. Linear in the number of rows: the physical limit is looked at
 * first, and the window only round what breaks it.
 *
 * Example: 31.0 m³/h in a bore of 102.26 mm and one reading of 310 m³/h (10.5 m/s) → that row.
 */
export interface SpikeLimits {
  /** Null where nobody knows it. */
  readonly boreMm: number | null;
  /** m/s; 5 unless given. */
  readonly maxSpeedMPerS?: number;
  /** K/min; 2 unless given. */
  readonly maxKPerMinute?: number;
}

export const SPIKE_WINDOW = 15;
export const SPIKE_DISTANCE = 6 * 1.4826;
export const SPIKE_SPEED_M_PER_S = 5;
export const SPIKE_K_PER_MINUTE = 2;
const LONGEST_SPIKE = (SPIKE_WINDOW - 1) / 2;

export type SpikeFinding = Finding<
  "spikes",
  {
    readonly spikes: number;
    /** The reading furthest from its neighbours, m³/h or °C, and their median. */
    readonly worst: number;
    readonly medianThere: number;
    readonly worstAtMs: number;
    /** What the worst reading asks of the water: m/s for flow, K/min for a temperature. */
    readonly worstRate: number;
    readonly limit: number;
  }
>;

/** At most one finding a channel, in the order flow, supply, return. */
export function hampelSpikes(segment: ReadingSegment, limits: SpikeLimits): SpikeFinding[] {
  const { flowM3PerHour, supplyC, returnC } = segment.columns;
  const { boreMm } = limits;
  const maxSpeed = limits.maxSpeedMPerS ?? SPIKE_SPEED_M_PER_S;
  const maxRate = limits.maxKPerMinute ?? SPIKE_K_PER_MINUTE;
  return [
    boreMm === null ? null : flowSpikes(segment, flowM3PerHour, boreMm, maxSpeed),
    temperatureSpikes(segment, "supplyC", supplyC, maxRate),
    temperatureSpikes(segment, "returnC", returnC, maxRate),
  ].filter((finding) => finding !== null);
}

interface Spike {
  readonly row: number;
  readonly value: number;
  readonly median: number;
  readonly rate: number;
}

function flowSpikes(
  segment: ReadingSegment,
  flow: Float64Array | null,
  boreMm: number,
  maxSpeedMPerS: number,
): SpikeFinding | null {
  const rows = readRows(segment, flow);
  if (!flow || !rows || rows.length < SPIKE_WINDOW) return null;
  const perM3PerHour = velocityMPerS(1, boreMm);
  const mostFlow = maxSpeedMPerS / perM3PerHour;
  const window = new NeighbourWindow(flow, rows);
  const spikes: Spike[] = [];
  for (let at = 0; at < rows.length; at++) {
    const value = flow[rows[at]!]!;
    if (Math.abs(value) <= mostFlow || !window.standsOut(at)) continue;
    const rate = Math.abs(value) * perM3PerHour;
    spikes.push({ row: rows[at]!, value, median: window.median, rate });
  }
  return findingOf(segment, "flowM3PerHour", spikes, maxSpeedMPerS);
}

function temperatureSpikes(
  segment: ReadingSegment,
  channel: "supplyC" | "returnC",
  values: Float64Array | null,
  maxKPerMinute: number,
): SpikeFinding | null {
  const rows = readRows(segment, values);
  if (!values || !rows || rows.length < SPIKE_WINDOW) return null;
  const { instantMs } = segment.columns;
  const maxKPerMs = maxKPerMinute / MINUTE_MS;
  const window = new NeighbourWindow(values, rows);
  const spikes: Spike[] = [];
  /** K/ms from one reading to the next; a start in the last minutes of a file looks like half a spike. */
  const jump = (from: number, to: number) =>
    from < 0 || to >= rows.length
      ? 0
      : Math.abs(values[rows[to]!]! - values[rows[from]!]!) /
        (instantMs[rows[to]!]! - instantMs[rows[from]!]!);
  for (let at = 0; at < rows.length; at++) {
    if (jump(at - 1, at) <= maxKPerMs) continue;
    // Where most readings are equal to the hundredth, MAD is 0 and any other one stands out.
    const least = (maxKPerMs * (instantMs[rows[at]!]! - instantMs[rows[at - 1]!]!)) / 2;
    if (!window.standsOut(at, least)) continue;
    let end = at;
    const run: Spike[] = [];
    while (end < rows.length && run.length <= LONGEST_SPIKE && window.standsOut(end, least)) {
      run.push({
        row: rows[end]!,
        value: values[rows[end]!]!,
        median: window.median,
        rate: Math.max(jump(end - 1, end), jump(end, end + 1)) * MINUTE_MS,
      });
      end++;
    }
    if (run.length <= LONGEST_SPIKE && jump(end - 1, end) > maxKPerMs) spikes.push(...run);
    at = end - 1;
  }
  return findingOf(segment, channel, spikes, maxKPerMinute);
}

function findingOf(
  segment: ReadingSegment,
  channel: "flowM3PerHour" | "supplyC" | "returnC",
  spikes: readonly Spike[],
  limit: number,
): SpikeFinding | null {
  const [first] = spikes;
  if (!first) return null;
  const distance = (spike: Spike) => Math.abs(spike.value - spike.median);
  const worst = spikes.reduce((a, b) => (distance(b) > distance(a) ? b : a), first);
  const place = placeOf(segment, rangesOfRows(spikes.map(({ row }) => row)));
  return {
    code: "spikes",
    weight: "look",
    channel,
    ...place,
    figures: {
      spikes: place.rows.length,
      worst: worst.value,
      medianThere: worst.median,
      worstAtMs: segment.columns.instantMs[worst.row]!,
      worstRate: worst.rate,
      limit,
    },
    choices: [{ change: "exclude", spans: place.spans }, KEEP],
  };
}

/** Medians of the 15 readings round a reading; one array is used again and again. */
class NeighbourWindow {
  median = NaN;
  private readonly sorted = new Float64Array(SPIKE_WINDOW);

  constructor(
    private readonly values: Float64Array,
    /** Rows of `values` that hold a reading, at least {@link SPIKE_WINDOW} of them. */
    private readonly rows: Uint32Array,
  ) {}

  /** `least`: a distance that at least is needed, however little the readings scatter. */
  standsOut(at: number, least = 0): boolean {
    const { values, rows, sorted } = this;
    const start = Math.min(Math.max(0, at - LONGEST_SPIKE), rows.length - SPIKE_WINDOW);
    for (let i = 0; i < SPIKE_WINDOW; i++) insert(sorted, i, values[rows[start + i]!]!);
    this.median = sorted[LONGEST_SPIKE]!;
    for (let i = 0; i < SPIKE_WINDOW; i++) insert(sorted, i, Math.abs(sorted[i]! - this.median));
    const mad = sorted[LONGEST_SPIKE]!;
    return Math.abs(values[rows[at]!]! - this.median) > Math.max(least, SPIKE_DISTANCE * mad);
  }
}

/** Puts a value among the first `count`, which are sorted. */
function insert(sorted: Float64Array, count: number, value: number): void {
  let i = count;
  while (i > 0 && sorted[i - 1]! > value) {
    sorted[i] = sorted[i - 1]!;
    i--;
  }
  sorted[i] = value;
}
