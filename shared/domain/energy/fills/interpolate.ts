import { HOUR_MS, type Interval } from "../../time/interval";
import {
  deviation,
  energyOf,
  openQuarters,
  percentOf,
  secondsOf,
  type FilledQuarter,
  type FillOutcome,
} from "./fill";

/** Longer gaps are not joined by a line: an hour is what published estimation rules allow. */
export const LONGEST_INTERPOLATED_MS = HOUR_MS;

/** A gap with the readings beside it. Power is as it counts, heating positive; flow may be unknown. */
export interface GapBetween extends Interval {
  readonly before: { readonly powerKw: number; readonly flowM3PerHour: number | null };
  readonly after: { readonly powerKw: number; readonly flowM3PerHour: number | null };
}

/**
 * Gaps of an hour at most, joined by a straight line of power from the reading before to the one
 * after; where the line crosses zero, each side goes to its own register.
 *
 * Uncertainty: the sample deviation of the quarter-hour powers around the gap (`aroundKw`), because
 * the power may have gone anywhere they go; at least what a line between two different ends leaves
 * open, their half difference taken as rectangular.
 *
 * Example: half an hour from 100 to 200 kW → 75 kWh, at least 50/√3/150 = 19.2 %.
 */
export function interpolate(gaps: readonly GapBetween[], aroundKw: readonly number[]): FillOutcome {
  if (gaps.length === 0) return { ok: false, problem: { code: "nothing-to-fill" } };
  const longestMs = Math.max(...gaps.map(({ startMs, endMs }) => endMs - startMs));
  if (longestMs > LONGEST_INTERPOLATED_MS)
    return { ok: false, problem: { code: "gap-too-long", longestMs } };
  const quarters = openQuarters(gaps).map((open): FilledQuarter => {
    let heatingKwh = 0;
    let coolingKwh = 0;
    let volumeM3: number | null = 0;
    for (const piece of open.pieces) {
      const gap = gaps.find(
        ({ startMs, endMs }) => startMs <= piece.startMs && piece.endMs <= endMs,
      );
      if (!gap) continue;
      const { positive, negative } = areas(gap, piece);
      heatingKwh += positive;
      coolingKwh += negative;
      const volume = volumeOf(gap, piece);
      volumeM3 = volume === null || volumeM3 === null ? null : volumeM3 + volume;
    }
    return { startMs: open.startMs, filledS: secondsOf(open), heatingKwh, coolingKwh, volumeM3 };
  });
  const hours = gaps.reduce((sum, { startMs, endMs }) => sum + (endMs - startMs), 0) / HOUR_MS;
  const ends = Math.max(
    ...gaps.map(({ before, after }) => Math.abs(after.powerKw - before.powerKw) / 2 / Math.sqrt(3)),
  );
  const openKw = Math.max(deviation(aroundKw), ends);
  const uncertaintyPercent = percentOf(openKw * hours, energyOf(quarters));
  return { ok: true, fill: { quarters, uncertaintyPercent, days: [] } };
}

/** The line's value at an instant of the gap. */
function lineAt({ startMs, endMs }: Interval, from: number, to: number, ms: number): number {
  return from + ((to - from) * (ms - startMs)) / (endMs - startMs);
}

/** kWh above and below zero of the line within a piece of its gap, both ≥ 0. */
function areas(gap: GapBetween, piece: Interval): { positive: number; negative: number } {
  const { before, after } = gap;
  const first = lineAt(gap, before.powerKw, after.powerKw, piece.startMs);
  const last = lineAt(gap, before.powerKw, after.powerKw, piece.endMs);
  const hours = (piece.endMs - piece.startMs) / HOUR_MS;
  const crossing = first * last < 0 ? first / (first - last) : null;
  const parts =
    crossing === null
      ? [((first + last) / 2) * hours]
      : [(first / 2) * crossing * hours, (last / 2) * (1 - crossing) * hours];
  return {
    positive: parts.reduce((sum, kwh) => sum + Math.max(0, kwh), 0),
    negative: parts.reduce((sum, kwh) => sum + Math.max(0, -kwh), 0),
  };
}

function volumeOf(gap: GapBetween, piece: Interval): number | null {
  const [first, last] = [gap.before.flowM3PerHour, gap.after.flowM3PerHour];
  if (first === null || last === null) return null;
  const at = (ms: number) => lineAt(gap, first, last, ms);
  return ((at(piece.startMs) + at(piece.endMs)) / 2) * ((piece.endMs - piece.startMs) / HOUR_MS);
}
