import type { Interval } from "@shared/domain/time/interval";

/** The longest `most` of the stretches, in order of time. */
export function longestRuns(runs: readonly Interval[], most: number): Interval[] {
  return [...runs]
    .sort((a, b) => b.endMs - b.startMs - (a.endMs - a.startMs))
    .slice(0, most)
    .sort((a, b) => a.startMs - b.startMs);
}
