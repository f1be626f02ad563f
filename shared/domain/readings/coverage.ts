import type { Gap } from "../log-files/repair-step";
import { durationMs, type Interval } from "../time/interval";
import { forEachCoveredStep, SURVEY_GAP_FACTOR, usableReadings } from "./covered-steps";
import type { ReadingColumns, ReadingSegment } from "./reading-columns";

/** How much of a stretch of time usable readings speak for. */
export interface Coverage {
  readonly coveredMs: number;
  readonly expectedMs: number;
  /** covered ÷ expected, 0 to 1; null where nothing is expected. */
  readonly completeness: number | null;
}

/** Coverage of `interval` by rows that hold flow and both temperatures, or a meter's power. */
export function coverage(
  segments: readonly ReadingSegment[],
  interval: Interval,
  gapFactor = SURVEY_GAP_FACTOR,
): Coverage {
  let coveredMs = 0;
  const usable = segments.map(({ columns }) => usableReadings(columns));
  forEachCoveredStep(
    segments,
    usable,
    gapFactor,
    (_s, _row, _s2, _row2, fromMs, toMs) => {
      const part = Math.min(toMs, interval.endMs) - Math.max(fromMs, interval.startMs);
      if (part > 0) coveredMs += part;
    },
    () => undefined,
  );
  const expectedMs = Math.max(0, durationMs(interval));
  return { coveredMs, expectedMs, completeness: expectedMs > 0 ? coveredMs / expectedMs : null };
}

/**
 * Steps over `gapFactor` nominal steps between rows of one series, ascending. A gap runs from the
 * row before it to the row after it; `missingRows` is how many the nominal step would have put there.
 */
export function gaps(
  columns: Pick<ReadingColumns, "instantMs" | "flowM3PerHour">,
  nominalStepMs: number,
  gapFactor = SURVEY_GAP_FACTOR,
): Gap[] {
  const { instantMs, flowM3PerHour } = columns;
  const found: Gap[] = [];
  const limit = gapFactor * nominalStepMs;
  for (let i = 1; i < instantMs.length; i++) {
    const step = instantMs[i]! - instantMs[i - 1]!;
    if (step <= limit) continue;
    found.push({
      fromMs: instantMs[i - 1]!,
      toMs: instantMs[i]!,
      missingRows: Math.max(1, Math.round(step / nominalStepMs) - 1),
      flowBeforeM3PerHour: known(flowM3PerHour?.[i - 1]),
      flowAfterM3PerHour: known(flowM3PerHour?.[i]),
    });
  }
  return found;
}

function known(value: number | undefined): number | null {
  return value === undefined || Number.isNaN(value) ? null : value;
}
