import { HOUR_MS, type Interval } from "../../time/interval";
import { INTERVAL_MS } from "../interval-energy";
import {
  deviation,
  energyOf,
  isWhole,
  openQuarters,
  percentOf,
  QUARTER_S,
  secondsOf,
  type CoveredQuarter,
  type FilledQuarter,
  type FillOutcome,
} from "./fill";

/** Less than this measured by both, and their ratio says nothing. */
export const LEAST_COMMON_HOURS = 24;

export interface OtherPointOptions {
  /** Where both points' readings are compared; the gap itself counts for nothing in it. */
  readonly common: Interval;
  readonly own: (startMs: number) => CoveredQuarter | null;
  readonly other: (startMs: number) => CoveredQuarter | null;
}

/**
 * Each quarter-hour of a gap as what another point measured then, times the ratio of both points over
 * the time that both measured whole: of sums, R = Σe/Σm, for each register and for volume. Where the
 * other point is not covered whole, the gap stays open.
 *
 * Uncertainty: the common time in windows as long as the filled time (an hour to a day): s of e − R·m
 * over the n windows is what one such stretch leaves open, and s/√n what the ratio does; both grow
 * with the number of windows filled as their kind does, √ and in proportion.
 *
 * Example: common time 120 and 100 kWh, gap 10 kWh at the other point → 12 kWh.
 */
export function otherPoint(
  gaps: readonly Interval[],
  { common, own, other }: OtherPointOptions,
): FillOutcome {
  const open = openQuarters(gaps);
  if (open.length === 0) return { ok: false, problem: { code: "nothing-to-fill" } };
  const both = commonQuarters(common, own, other);
  const hours = (both.length * INTERVAL_MS) / HOUR_MS;
  if (hours < LEAST_COMMON_HOURS)
    return { ok: false, problem: { code: "too-little-in-common", hours } };
  const ratios = {
    heatingKwh: ratioOf(both, ({ heatingKwh }) => heatingKwh),
    coolingKwh: ratioOf(both, ({ coolingKwh }) => coolingKwh),
    volumeM3: ratioOf(both, ({ volumeM3 }) => volumeM3 ?? 0),
  };
  const { heatingKwh: heatingRatio, coolingKwh: coolingRatio, volumeM3: volumeRatio } = ratios;
  if (heatingRatio === null || coolingRatio === null)
    return { ok: false, problem: { code: "other-point-at-rest" } };
  const quarters = open.flatMap((quarter): FilledQuarter[] => {
    const measured = other(quarter.startMs);
    if (!measured || !isWhole(measured)) return [];
    const share = secondsOf(quarter) / QUARTER_S;
    const volume = measured.volumeM3;
    return [
      {
        startMs: quarter.startMs,
        filledS: secondsOf(quarter),
        heatingKwh: share * heatingRatio * measured.heatingKwh,
        coolingKwh: share * coolingRatio * measured.coolingKwh,
        volumeM3: volume === null || volumeRatio === null ? null : share * volumeRatio * volume,
      },
    ];
  });
  if (quarters.length === 0) return { ok: false, problem: { code: "other-point-open" } };
  const residuals = both.map(
    ([e, m]) =>
      e.heatingKwh - heatingRatio * m.heatingKwh + (e.coolingKwh - coolingRatio * m.coolingKwh),
  );
  const filledQuarters = quarters.reduce((sum, { filledS }) => sum + filledS, 0) / QUARTER_S;
  const leftOpenKwh = openOf(residuals, filledQuarters);
  const uncertaintyPercent = percentOf(leftOpenKwh, energyOf(quarters));
  return { ok: true, fill: { quarters, uncertaintyPercent, days: [] } };
}

type Pair = readonly [own: CoveredQuarter, other: CoveredQuarter];

function commonQuarters(
  { startMs, endMs }: Interval,
  own: OtherPointOptions["own"],
  other: OtherPointOptions["other"],
): Pair[] {
  const pairs: Pair[] = [];
  const first = Math.ceil(startMs / INTERVAL_MS) * INTERVAL_MS;
  for (let at = first; at + INTERVAL_MS <= endMs; at += INTERVAL_MS) {
    const [e, m] = [own(at), other(at)];
    if (e && m && isWhole(e) && isWhole(m)) pairs.push([e, m]);
  }
  return pairs;
}

/** Σ own ÷ Σ other; 0 where neither ran; null where the other one rested and the own one did not. */
function ratioOf(pairs: readonly Pair[], of: (quarter: CoveredQuarter) => number): number | null {
  const e = pairs.reduce((sum, [own]) => sum + of(own), 0);
  const m = pairs.reduce((sum, [, other]) => sum + of(other), 0);
  if (m > 0) return e / m;
  return e > 0 ? null : 0;
}

/** kWh that a fill of so many quarter-hours leaves open, from what the ratio left in common time. */
function openOf(residuals: readonly number[], filledQuarters: number): number {
  const length = Math.min(96, Math.max(4, Math.round(filledQuarters)));
  const windows: number[] = [];
  for (let from = 0; from + length <= residuals.length; from += length)
    windows.push(residuals.slice(from, from + length).reduce((sum, kwh) => sum + kwh, 0));
  const s = deviation(windows);
  const filled = filledQuarters / length;
  return Math.hypot(Math.sqrt(filled) * s, (filled * s) / Math.sqrt(Math.max(1, windows.length)));
}
