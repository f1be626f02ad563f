import { RowQuality, type ReadingColumns, type ReadingSegment } from "./reading-columns";

/**
 * Which stretch of time each row, or pair of rows, speaks for.
 *
 * Instantaneous rows speak for the time between two neighbours. A mean speaks for the time from its
 * label to the next (`meanFromLabel`) or from the label before to its own (`meanToLabel`); where
 * that is over `gapFactor` nominal steps, and at the file's ends, for one nominal step. A step of
 * instantaneous rows over `gapFactor` nominal steps is a hole. Rows that are not usable speak for
 * nothing, and nothing speaks across them, nor between two segments of which the later starts anew. Stretches never overlap; between two instantaneous
 * segments the coarser nominal step decides what a gap is.
 */

/** Survey rule; billing tightens it to 1.5 of a calculation, never of what is stored. */
export const SURVEY_GAP_FACTOR = 3;
export const BILLING_GAP_FACTOR = 1.5;

export type GapRule = "survey" | "billing";
/** A step over this many nominal steps is a hole. */
export const GAP_FACTOR: Readonly<Record<GapRule, number>> = {
  survey: SURVEY_GAP_FACTOR,
  billing: BILLING_GAP_FACTOR,
};

/** `first` and `second` are row indexes in their segments; for a mean both name the same row. */
export type VisitStep = (
  firstSegment: number,
  firstRow: number,
  secondSegment: number,
  secondRow: number,
  fromMs: number,
  toMs: number,
) => void;

/** Segment indexes by first instant. Empty segments are left out. */
export function segmentOrder(segments: readonly ReadingSegment[]): number[] {
  const first = (index: number) => segments[index]!.columns.instantMs[0]!;
  return segments
    .map((_, index) => index)
    .filter((index) => segments[index]!.columns.instantMs.length > 0)
    .sort((a, b) => first(a) - first(b));
}

/**
 * Calls `visit` for every covered stretch in order of time. `usable[s][row]` is 0 for rows that
 * cannot be used; `onRow` is called once a row, before the stretch that starts at it.
 * @throws RangeError where instants do not ascend or segments overlap.
 */
export function forEachCoveredStep(
  segments: readonly ReadingSegment[],
  usable: readonly Uint8Array[],
  gapFactor: number,
  visit: VisitStep,
  onRow: (segment: number, row: number) => void,
): void {
  const order = segmentOrder(segments);
  let coveredUntil = -Infinity;
  let lastSegment = -1;
  for (let position = 0; position < order.length; position++) {
    const s = order[position]!;
    const { kind, nominalStepMs, columns } = segments[s]!;
    const { instantMs } = columns;
    const ok = usable[s]!;
    const count = instantMs.length;
    const limit = gapFactor * nominalStepMs;
    const following = order[position + 1];
    const nextStart =
      following === undefined ? Infinity : segments[following]!.columns.instantMs[0]!;
    if (!(instantMs[count - 1]! < nextStart)) throw notAscending(nextStart);

    if (lastSegment >= 0 && kind === "instantaneous" && !segments[s]!.startsAnew) {
      const before = segments[lastSegment]!;
      const lastRow = before.columns.instantMs.length - 1;
      const step = instantMs[0]! - before.columns.instantMs[lastRow]!;
      const joins =
        before.kind === "instantaneous" &&
        step <= gapFactor * Math.max(nominalStepMs, before.nominalStepMs) &&
        usable[lastSegment]![lastRow] !== 0 &&
        ok[0] !== 0;
      if (joins) visit(lastSegment, lastRow, s, 0, instantMs[0]! - step, instantMs[0]!);
    }

    for (let i = 0; i < count; i++) {
      const instant = instantMs[i]!;
      if (i > 0 && !(instant > instantMs[i - 1]!)) throw notAscending(instant);
      if (kind === "meanToLabel") {
        if (ok[i] !== 0) {
          const step = i > 0 ? instant - instantMs[i - 1]! : Infinity;
          const from = Math.max(instant - (step <= limit ? step : nominalStepMs), coveredUntil);
          if (from < instant) visit(s, i, s, i, from, instant);
        }
        coveredUntil = Math.max(coveredUntil, instant);
        onRow(s, i);
        continue;
      }
      onRow(s, i);
      coveredUntil = Math.max(coveredUntil, instant);
      if (ok[i] === 0) continue;
      if (kind === "instantaneous") {
        if (i + 1 === count || ok[i + 1] === 0) continue;
        const next = instantMs[i + 1]!;
        if (next - instant <= limit) visit(s, i, s, i + 1, instant, next);
      } else {
        const next = i + 1 < count ? instantMs[i + 1]! : nextStart;
        const inside = i + 1 < count && next - instant <= limit;
        const to = inside ? next : Math.min(instant + nominalStepMs, next);
        if (instant < to) visit(s, i, s, i, instant, to);
        coveredUntil = Math.max(coveredUntil, to);
      }
    }
    lastSegment = s;
  }
}

/** 1 for rows that are measured and hold every channel given; 0 for the rest. */
export function usableRows(
  quality: Uint8Array,
  channels: readonly (Float64Array | null)[],
): Uint8Array {
  const usable = new Uint8Array(quality.length);
  if (channels.some((channel) => channel === null)) return usable;
  const measured = RowQuality.measured;
  for (let i = 0; i < quality.length; i++) usable[i] = quality[i] === measured ? 1 : 0;
  for (const channel of channels) {
    if (channel === null) continue;
    // NaN is the one value that differs from itself; asking Number costs four times as much.
    for (let i = 0; i < channel.length; i++) if (channel[i] !== channel[i]) usable[i] = 0;
  }
  return usable;
}

/** 1 for measured rows that say how much heat moved: by flow and both temperatures, or by a meter. */
export function usableReadings(columns: ReadingColumns): Uint8Array {
  const { quality, flowM3PerHour, supplyC, returnC } = columns;
  const usable = usableRows(quality, [flowM3PerHour, supplyC, returnC]);
  for (const metered of [columns.powerKw, columns.heatingKw, columns.coolingKw]) {
    if (!metered) continue;
    for (let i = 0; i < usable.length; i++)
      if (metered[i] === metered[i] && quality[i] === RowQuality.measured) usable[i] = 1;
  }
  return usable;
}

function notAscending(instantMs: number): RangeError {
  return new RangeError(
    `Readings must ascend and segments must not overlap; ${new Date(instantMs).toISOString()} does not. Resolve the files first.`,
  );
}
