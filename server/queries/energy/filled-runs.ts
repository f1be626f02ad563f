import type { QualityRun } from "@shared/domain/readings/quality-runs";
import { overlap, type Interval } from "@shared/domain/time/interval";

/** A run as people see it: a stretch that readings do not cover may be filled. */
export interface ShownRun extends Omit<QualityRun, "kind"> {
  readonly kind: QualityRun["kind"] | "filled";
}

/**
 * The runs with what is filled of them as runs of its own. What was measured stays measured; rows of
 * a run that is cut go with the time.
 */
export function withFills(runs: readonly QualityRun[], filled: readonly Interval[]): ShownRun[] {
  if (filled.length === 0) return [...runs];
  return runs.flatMap((run) => (run.kind === "measured" ? [run] : cut(run, filled)));
}

function cut(run: QualityRun, filled: readonly Interval[]): ShownRun[] {
  const parts: ShownRun[] = [];
  const lengthMs = run.endMs - run.startMs;
  const add = (kind: ShownRun["kind"], startMs: number, endMs: number) => {
    if (!(startMs < endMs)) return;
    const rows = Math.max(
      run.rows > 0 ? 1 : 0,
      Math.round((run.rows * (endMs - startMs)) / lengthMs),
    );
    parts.push({ ...run, kind, startMs, endMs, rows });
  };
  let at = run.startMs;
  for (const stretch of filled) {
    const shared = overlap(run, stretch);
    if (!shared) continue;
    add(run.kind, at, shared.startMs);
    add("filled", shared.startMs, shared.endMs);
    at = shared.endMs;
  }
  add(run.kind, at, run.endMs);
  return parts;
}
