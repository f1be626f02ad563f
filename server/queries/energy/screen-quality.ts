import type { SeriesAnswer } from "@shared/contracts/energy";
import type { ShownRun } from "./filled-runs";

/**
 * Runs as a strip can show them: troubles of one kind with less than `leastMs` measured between them
 * become one, so that a year of short gaps does not send thousands of marks for as many pixels.
 */
export function screenQuality(runs: readonly ShownRun[], leastMs: number): SeriesAnswer["quality"] {
  const shown: SeriesAnswer["quality"] = [];
  for (const given of runs) {
    // The step after a log's last row is not covered, yet no row is lacking: nothing to mark.
    const run = given.rows === 0 ? { ...given, kind: "measured" as const } : given;
    const last = shown.at(-1);
    const before = shown.at(-2);
    const bridges =
      last?.kind === "measured" &&
      before?.kind === run.kind &&
      run.kind !== "measured" &&
      last.toMs - last.fromMs < leastMs;
    if (bridges && before) {
      shown.pop();
      before.toMs = run.endMs;
    } else if (last?.kind === run.kind) last.toMs = run.endMs;
    else shown.push({ fromMs: run.startMs, toMs: run.endMs, kind: run.kind });
  }
  return shown;
}
