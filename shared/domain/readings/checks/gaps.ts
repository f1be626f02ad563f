import { DAY_MS, HOUR_MS, type Interval } from "../../time/interval";
import { GAP_FACTOR, type GapRule } from "../covered-steps";
import { RowQuality, type ReadingSegment } from "../reading-columns";
import { KEEP, type Finding } from "./finding";

/**
 * Stretches without readings, by length: more than 3 nominal steps for a survey, 1.5 for billing. A
 * gap runs from the reading before it to the reading after it. A row that says "no reading" is none; a
 * row that somebody left out is one, since leaving it out was a choice. Nothing is drawn across a gap:
 * it stays a hole, and completeness says how much is missing.
 *
 * Completeness is the time outside gaps by the time from the first reading to the end of the last one's
 * step; a gap takes its length less the one step that the reading before it speaks for.
 *
 * Lengths are told apart where what may fill them changes: up to 1 hour, up to 1 day, longer.
 *
 * Example: quarter-hours from 0:00 to 1:00 and again from 4:00 to 5:00: one gap of 3 h, 11 rows missing.
 */
export interface GapSummary {
  readonly rule: GapRule;
  readonly count: number;
  readonly missingMs: number;
  readonly missingRows: number;
  readonly longest: Interval | null;
  /** 0 to 1; null without readings. */
  readonly completeness: number | null;
  readonly byLength: Readonly<Record<GapLength, GapsOfLength>>;
  /** Ascending. */
  readonly gaps: readonly Interval[];
}

export type GapLength = "upToHour" | "upToDay" | "overDay";

export interface GapsOfLength {
  readonly count: number;
  readonly missingMs: number;
}

/** Below this completeness a period cannot be billed without approval. */
const LEAST_COMPLETENESS = 0.95;

export type GapsFinding = Finding<
  "gaps",
  {
    readonly rule: GapRule;
    readonly count: number;
    readonly missingHours: number;
    readonly missingRows: number;
    readonly longestHours: number;
    readonly longestFromMs: number;
    readonly completenessPercent: number;
    readonly upToHour: number;
    readonly upToDay: number;
    readonly overDay: number;
  }
>;

export function summariseGaps(segment: ReadingSegment, rule: GapRule): GapSummary {
  const { columns, nominalStepMs } = segment;
  const { instantMs, quality } = columns;
  const step = Math.max(1, nominalStepMs);
  const limit = GAP_FACTOR[rule] * step;
  const gaps: Interval[] = [];
  const byLength: Record<GapLength, { count: number; missingMs: number }> = {
    upToHour: { count: 0, missingMs: 0 },
    upToDay: { count: 0, missingMs: 0 },
    overDay: { count: 0, missingMs: 0 },
  };
  let missingMs = 0;
  let missingRows = 0;
  let longest: Interval | null = null;
  let firstMs = NaN;
  let beforeMs = NaN;
  for (let row = 0; row < instantMs.length; row++) {
    if (quality[row] === RowQuality.noReading) continue;
    const instant = instantMs[row]!;
    const length = instant - beforeMs;
    if (length > limit) {
      const gap = { startMs: beforeMs, endMs: instant };
      gaps.push(gap);
      if (longest === null || length > longest.endMs - longest.startMs) longest = gap;
      const missing = length - step;
      missingMs += missing;
      missingRows += Math.max(1, Math.round(length / step) - 1);
      const group = byLength[lengthOf(length)];
      group.count++;
      group.missingMs += missing;
    }
    if (firstMs !== firstMs) firstMs = instant;
    beforeMs = instant;
  }
  const expectedMs = beforeMs - firstMs + step;
  return {
    rule,
    count: gaps.length,
    missingMs,
    missingRows,
    longest,
    completeness: expectedMs > 0 ? 1 - missingMs / expectedMs : null,
    byLength,
    gaps,
  };
}

/** Null where there is no gap. */
export function gapsFinding(segment: ReadingSegment, rule: GapRule): GapsFinding | null {
  const summary = summariseGaps(segment, rule);
  const { longest, completeness, byLength } = summary;
  if (longest === null || completeness === null) return null;
  return {
    code: "gaps",
    weight: completeness < LEAST_COMPLETENESS ? "look" : "note",
    channel: null,
    rows: [],
    rowCount: 0,
    spans: summary.gaps,
    figures: {
      rule,
      count: summary.count,
      missingHours: summary.missingMs / HOUR_MS,
      missingRows: summary.missingRows,
      longestHours: (longest.endMs - longest.startMs) / HOUR_MS,
      longestFromMs: longest.startMs,
      completenessPercent: completeness * 100,
      upToHour: byLength.upToHour.count,
      upToDay: byLength.upToDay.count,
      overDay: byLength.overDay.count,
    },
    choices: [KEEP],
  };
}

function lengthOf(gapMs: number): GapLength {
  if (gapMs <= HOUR_MS) return "upToHour";
  return gapMs <= DAY_MS ? "upToDay" : "overDay";
}
