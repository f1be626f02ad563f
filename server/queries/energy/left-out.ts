import { qualityRuns, type QualityRun } from "@shared/domain/readings/quality-runs";
import type { Interval } from "@shared/domain/time/interval";
import { DAY_MS } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { loadSegments } from "@server/readings/load-segments";
import { breathe } from "./breathe";

/** Months of one-minute rows are unpacked in parts, so that other requests are served between. */
const partMs = 60 * DAY_MS;

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
  const endMs = Math.min(range.endMs, nowMs);
  const runs: QualityRun[] = [];
  for (let startMs = range.startMs; startMs < endMs; startMs += partMs) {
    const part = { startMs, endMs: Math.min(startMs + partMs, endMs) };
    const segments = await loadSegments(database, pointId, part.startMs, part.endMs);
    for (const run of qualityRuns(segments, part)) append(runs, run);
    await breathe();
  }
  return runs;
}

function append(runs: QualityRun[], run: QualityRun): void {
  const last = runs.at(-1);
  if (last && last.endMs === run.startMs && last.kind === run.kind && last.reason === run.reason)
    runs[runs.length - 1] = { ...last, endMs: run.endMs, rows: last.rows + run.rows };
  else runs.push(run);
}

/** The longest of the runs that are not measured, in order of time. */
export function leftOut(runs: readonly QualityRun[], most: number): QualityRun[] {
  return runs
    .filter((run) => run.kind !== "measured")
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
