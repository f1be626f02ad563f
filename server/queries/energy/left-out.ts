import { qualityRuns, type QualityRun } from "@shared/domain/readings/quality-runs";
import type { Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import type { ShownRun } from "./filled-runs";
import { readingParts } from "./reading-parts";

/**
 * The runs of quality of a range, joined over the parts they are worked out in. The time yet to
 * come is no run: nothing is missing from it.
 */
export async function loadQualityRuns(
  database: Database,
  pointId: string,
  range: Interval,
  nowMs: number,
): Promise<QualityRun[]> {
  const seen = { startMs: range.startMs, endMs: Math.min(range.endMs, nowMs) };
  const runs: QualityRun[] = [];
  for await (const part of readingParts(database, pointId, seen)) {
    appendRuns(runs, qualityRuns(part.segments, part, part.gapFactor));
  }
  return runs;
}

/** Adds the runs of the part that follows; one that goes on over the edge stays one. */
export function appendRuns(runs: QualityRun[], following: readonly QualityRun[]): void {
  for (const run of following) append(runs, run);
}

function append(runs: QualityRun[], run: QualityRun): void {
  const last = runs.at(-1);
  if (last && last.endMs === run.startMs && last.kind === run.kind && last.reason === run.reason)
    runs[runs.length - 1] = { ...last, endMs: run.endMs, rows: last.rows + run.rows };
  else runs.push(run);
}

/** Runs in which rows are left out. The step after a log's last row lacks time but no row. */
export function leftOutRuns<Run extends ShownRun>(runs: readonly Run[]): Run[] {
  return runs.filter((run) => run.kind !== "measured" && run.rows > 0);
}

/** The longest of them, in order of time. */
export function longest<Run extends ShownRun>(runs: readonly Run[], most: number): Run[] {
  return [...runs]
    .sort((a, b) => b.endMs - b.startMs - (a.endMs - a.startMs))
    .slice(0, most)
    .sort((a, b) => a.startMs - b.startMs);
}

export function measuredSeconds(runs: readonly QualityRun[]): number {
  return runs.reduce(
    (sum, run) => (run.kind === "measured" ? sum + (run.endMs - run.startMs) / 1000 : sum),
    0,
  );
}
