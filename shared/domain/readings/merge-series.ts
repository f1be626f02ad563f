import type { SeriesKind } from "./reading-columns";
import { SURVEY_GAP_FACTOR } from "./covered-steps";

/**
 * Rows of several files of one point in one order, each instant once.
 *
 * At equal instants the file of higher precedence wins, its holes included: a row that somebody
 * excluded does not come back from an older file. Files of the same kind and step complete each
 * other row by row. A file of another kind or step only fills what the better file leaves open,
 * because its rows would speak twice for the same time.
 */
export interface MergeSource {
  /** Greater wins. */
  readonly precedence: number;
  readonly kind: SeriesKind;
  /** Rows of counters, which make steps only with each other. */
  readonly counts?: boolean;
  readonly nominalStepMs: number;
  /** Strictly ascending. */
  readonly instantMs: Float64Array;
}

/** Row `row` of source `source`, and so on for `length` rows. */
export interface Run {
  readonly source: number;
  readonly row: number;
  readonly length: number;
}

/** Steps that differ by less than this are the same setting seen through jitter. */
const SAME_STEP = 0.1;

export function sameSeries(a: MergeSource, b: MergeSource): boolean {
  const most = Math.max(a.nominalStepMs, b.nominalStepMs);
  return (
    a.kind === b.kind &&
    (a.counts ?? false) === (b.counts ?? false) &&
    Math.abs(a.nominalStepMs - b.nominalStepMs) <= SAME_STEP * most
  );
}

/** The kept rows of all sources as runs in ascending order of time. */
export function mergeSeries(sources: readonly MergeSource[]): Run[] {
  const byPrecedence = sources
    .map((_, index) => index)
    .filter((index) => sources[index]!.instantMs.length > 0)
    // Equal precedence: the file that starts first, so that the order of the list does not matter.
    .sort(
      (a, b) =>
        sources[b]!.precedence - sources[a]!.precedence ||
        sources[a]!.instantMs[0]! - sources[b]!.instantMs[0]! ||
        sources[b]!.instantMs.length - sources[a]!.instantMs.length,
    );
  const keptRuns: Run[] = [];
  byPrecedence.forEach((index, position) => {
    const rivals = byPrecedence
      .slice(0, position)
      .filter((rival) => reachesInto(sources[rival]!, sources[index]!));
    if (rivals.length === 0) {
      keptRuns.push({ source: index, row: 0, length: sources[index]!.instantMs.length });
      return;
    }
    const dropped = new Uint8Array(sources[index]!.instantMs.length);
    for (const rival of rivals) dropSpoken(sources[index]!, sources[rival]!, dropped);
    pushKept(keptRuns, index, dropped);
  });
  return interleave(sources, keptRuns);
}

function reachesInto(rival: MergeSource, source: MergeSource): boolean {
  const margin = Math.max(rival.nominalStepMs, 0);
  const rivalFrom = rival.instantMs[0]! - margin;
  const rivalTo = rival.instantMs[rival.instantMs.length - 1]! + margin;
  return (
    rivalFrom <= source.instantMs[source.instantMs.length - 1]! && rivalTo >= source.instantMs[0]!
  );
}

/** Marks the rows of `source` for which the better `rival` speaks. */
function dropSpoken(source: MergeSource, rival: MergeSource, dropped: Uint8Array): void {
  const same = sameSeries(source, rival);
  const at = rival.instantMs;
  const limit = SURVEY_GAP_FACTOR * rival.nominalStepMs;
  let next = 0;
  for (let i = 0; i < dropped.length; i++) {
    const instant = source.instantMs[i]!;
    while (next < at.length && at[next]! < instant) next++;
    if (next < at.length && at[next] === instant) {
      dropped[i] = 1;
      continue;
    }
    if (same) continue;
    const before = next > 0 ? at[next - 1]! : -Infinity;
    const after = next < at.length ? at[next]! : Infinity;
    const spoken =
      after - before <= limit ||
      (rival.kind === "meanFromLabel" && instant - before < rival.nominalStepMs) ||
      (rival.kind === "meanToLabel" && after - instant < rival.nominalStepMs);
    if (spoken) dropped[i] = 1;
  }
}

function pushKept(runs: Run[], source: number, dropped: Uint8Array): void {
  let row = 0;
  while (row < dropped.length) {
    if (dropped[row] !== 0) {
      row++;
      continue;
    }
    let end = row + 1;
    while (end < dropped.length && dropped[end] === 0) end++;
    runs.push({ source, row, length: end - row });
    row = end;
  }
}

/** Orders runs by time, breaking them where another's rows lie between. */
function interleave(sources: readonly MergeSource[], runs: readonly Run[]): Run[] {
  const instant = (run: Run, offset: number) => sources[run.source]!.instantMs[run.row + offset]!;
  const queue = [...runs].sort((a, b) => instant(a, 0) - instant(b, 0));
  const merged: Run[] = [];
  for (const run of queue) {
    // Pieces that lie before the run stay; those it reaches into are merged with it row by row.
    let keep = merged.length;
    while (keep > 0 && instant(merged[keep - 1]!, merged[keep - 1]!.length - 1) > instant(run, 0)) {
      keep--;
    }
    const reached = merged.slice(keep);
    if (reached.length === 0) merged.push(run);
    else merged.splice(keep, reached.length, ...zip(reached, run, instant));
  }
  return merged;
}

function zip(
  pieces: readonly Run[],
  run: Run,
  instant: (run: Run, offset: number) => number,
): Run[] {
  const zipped: Run[] = [];
  let taken = 0;
  const take = (before: number) => {
    const from = taken;
    while (taken < run.length && instant(run, taken) < before) taken++;
    if (taken > from) {
      zipped.push({ source: run.source, row: run.row + from, length: taken - from });
    }
  };
  for (const piece of pieces) {
    let from = 0;
    for (let i = 0; i < piece.length; i++) {
      const here = instant(piece, i);
      if (taken < run.length && instant(run, taken) < here) {
        if (i > from)
          zipped.push({ source: piece.source, row: piece.row + from, length: i - from });
        take(here);
        from = i;
      }
    }
    if (piece.length > from) {
      zipped.push({ source: piece.source, row: piece.row + from, length: piece.length - from });
    }
  }
  take(Infinity);
  return zipped;
}
