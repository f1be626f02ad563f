import type { Interval } from "../time/interval";
import {
  forEachCoveredStep,
  segmentOrder,
  SURVEY_GAP_FACTOR,
  usableReadings,
} from "./covered-steps";
import { RowQuality, type ReadingSegment } from "./reading-columns";

/**
 * A stretch of time by what the readings are worth there. `measured` is what energy covers; the rest
 * is named by what most of its rows are. `filled` never comes from readings alone.
 */
export interface QualityRun extends Interval {
  readonly kind: "measured" | "excluded" | "missing";
  /** Rows left out: those there, plus those the nominal step would have put there. 0 if measured. */
  readonly rows: number;
  readonly reason: LeftOutReason | null;
}

export type LeftOutReason = "weakSignal" | "noReading" | "noRows" | "noTemperature";

/**
 * The whole of `window` as runs, in order, without holes between them. Time before the first and
 * after the last row is missing.
 */
export function qualityRuns(
  segments: readonly ReadingSegment[],
  window: Interval,
  gapFactor = SURVEY_GAP_FACTOR,
): QualityRun[] {
  const runs: QualityRun[] = [];
  const rest = new LeftOutCounter(segments);
  let openMs = window.startMs;
  let measuredFrom = NaN;
  const close = (untilMs: number) => {
    if (untilMs > openMs) runs.push(rest.run(openMs, untilMs));
  };
  const usable = segments.map(({ columns }) => usableReadings(columns));
  const endMeasured = () => {
    if (measuredFrom < openMs)
      runs.push({ startMs: measuredFrom, endMs: openMs, kind: "measured", rows: 0, reason: null });
    measuredFrom = NaN;
  };
  forEachCoveredStep(
    segments,
    usable,
    gapFactor,
    (_s, _row, _s2, _row2, fromMs, toMs) => {
      const from = Math.max(fromMs, window.startMs);
      const to = Math.min(toMs, window.endMs);
      if (!(to > from)) return;
      if (from > openMs || Number.isNaN(measuredFrom)) {
        endMeasured();
        close(from);
        measuredFrom = from;
      }
      openMs = to;
    },
    () => undefined,
  );
  endMeasured();
  close(window.endMs);
  return runs;
}

/** Counts, in order of time, what became of the rows of stretches that are not covered. */
class LeftOutCounter {
  private readonly order: readonly number[];

  constructor(private readonly segments: readonly ReadingSegment[]) {
    this.order = segmentOrder(segments);
  }

  run(startMs: number, endMs: number): QualityRun {
    const counts = { excluded: 0, noReading: 0, noTemperature: 0 };
    let nearest: ReadingSegment | null = null;
    let startsOnRow = false;
    for (const index of this.order) {
      const segment = this.segments[index] as ReadingSegment;
      const { instantMs, quality } = segment.columns;
      // The rows before the stretch say how often rows were due; where none come before, those after.
      if (nearest === null || (instantMs[0] as number) <= startMs) nearest = segment;
      // A mean labelled with its end belongs to the time before its label.
      const late = segment.kind === "meanToLabel" ? 1 : 0;
      for (let row = firstAfter(instantMs, startMs - 1 + late); row < instantMs.length; row++) {
        const at = instantMs[row] as number;
        if (at >= endMs + late) break;
        if (quality[row] === RowQuality.excluded) counts.excluded++;
        else if (quality[row] === RowQuality.noReading) counts.noReading++;
        else if (quality[row] !== RowQuality.opening && isUnusable(segment, row))
          counts.noTemperature++;
        else if (at === startMs) startsOnRow = true;
      }
    }
    const there = counts.excluded + counts.noReading + counts.noTemperature;
    const due = nearest === null ? 0 : Math.round((endMs - startMs) / nearest.nominalStepMs);
    const absent = Math.max(0, due - (startsOnRow ? 1 : 0) - there);
    const rows = there + absent;
    const most = Math.max(counts.excluded, counts.noReading, counts.noTemperature, absent);
    const outcome = (kind: "excluded" | "missing", reason: LeftOutReason) =>
      ({ startMs, endMs, kind, rows, reason }) satisfies QualityRun;
    if (there > 0 && counts.excluded === most) return outcome("excluded", "weakSignal");
    if (there > 0 && counts.noReading === most) return outcome("missing", "noReading");
    if (there > 0 && counts.noTemperature === most) return outcome("missing", "noTemperature");
    return outcome("missing", "noRows");
  }
}

function isUnusable({ columns }: ReadingSegment, row: number): boolean {
  const { powerKw, heatingKw, coolingKw } = columns;
  const isMetered = [powerKw, heatingKw, coolingKw].some(
    (channel) => channel && !Number.isNaN(channel[row]),
  );
  if (isMetered) return false;
  return (
    columns.supplyC === null ||
    columns.returnC === null ||
    Number.isNaN(columns.supplyC[row]) ||
    Number.isNaN(columns.returnC[row])
  );
}

function firstAfter(instantMs: Float64Array, ms: number): number {
  let low = 0;
  let high = instantMs.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((instantMs[middle] as number) <= ms) low = middle + 1;
    else high = middle;
  }
  return low;
}
