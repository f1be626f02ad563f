import { INTERVAL_MS } from "../interval-energy";
import { overlap, type Interval } from "../../time/interval";

/** The part of one quarter-hour that readings do not cover. */
export interface OpenQuarter {
  /** Start of the quarter-hour. */
  readonly startMs: number;
  /** What is not covered of it, in order. */
  readonly pieces: readonly Interval[];
}

/** What a fill puts into one quarter-hour. Never added to what was measured there. */
export interface FilledQuarter {
  readonly startMs: number;
  readonly filledS: number;
  readonly heatingKwh: number;
  readonly coolingKwh: number;
  /** Null where the source knows no volume. */
  readonly volumeM3: number | null;
}

/** A fill worked out, with the standard uncertainty of its energy in percent. */
export interface WorkedFill {
  readonly quarters: readonly FilledQuarter[];
  readonly uncertaintyPercent: number;
  /** Days it was taken from. */
  readonly days: readonly string[];
}

export type FillProblem =
  | { readonly code: "nothing-to-fill" }
  | { readonly code: "gap-too-long"; readonly longestMs: number }
  | { readonly code: "no-reading-beside" }
  | { readonly code: "too-few-like-days"; readonly date: string; readonly found: number }
  | { readonly code: "too-little-in-common"; readonly hours: number }
  | { readonly code: "other-point-at-rest" }
  | { readonly code: "other-point-open" };

export type FillOutcome =
  | { readonly ok: true; readonly fill: WorkedFill }
  | { readonly ok: false; readonly problem: FillProblem };

/** What a quarter-hour of readings holds. */
export interface CoveredQuarter {
  readonly coveredS: number;
  readonly heatingKwh: number;
  readonly coolingKwh: number;
  readonly volumeM3: number | null;
}

export const QUARTER_S = INTERVAL_MS / 1000;
/** Covered seconds are stored as floats: half a second short is whole. */
export const isWhole = ({ coveredS }: CoveredQuarter) => coveredS >= QUARTER_S - 0.5;

/** Gaps by the quarter-hour, in order; two in one quarter-hour are two pieces of it. */
export function openQuarters(gaps: readonly Interval[]): OpenQuarter[] {
  const quarters = new Map<number, Interval[]>();
  for (const gap of gaps) {
    const first = Math.floor(gap.startMs / INTERVAL_MS) * INTERVAL_MS;
    for (let startMs = first; startMs < gap.endMs; startMs += INTERVAL_MS) {
      const piece = overlap(gap, { startMs, endMs: startMs + INTERVAL_MS });
      if (piece) quarters.set(startMs, [...(quarters.get(startMs) ?? []), piece]);
    }
  }
  return [...quarters].sort(([a], [b]) => a - b).map(([startMs, pieces]) => ({ startMs, pieces }));
}

export function secondsOf({ pieces }: OpenQuarter): number {
  return pieces.reduce((sum, { startMs, endMs }) => sum + (endMs - startMs), 0) / 1000;
}

/** Sample deviation, n − 1; 0 with fewer than two values. */
export function deviation(values: readonly number[]): number {
  if (values.length < 2) return 0;
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return Math.sqrt(squares / (values.length - 1));
}

/** Heating and cooling energy together: both are ≥ 0 and neither makes up for the other. */
export function energyOf(quarters: readonly FilledQuarter[]): number {
  return quarters.reduce((sum, quarter) => sum + quarter.heatingKwh + quarter.coolingKwh, 0);
}

export function percentOf(part: number, whole: number): number {
  return whole > 0 ? (100 * part) / whole : 0;
}
