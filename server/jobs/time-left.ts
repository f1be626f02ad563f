import type { JobProgress } from "@server/models/job";

/**
 * Seconds a job still takes, from the pace of its present stage: an import reads, then stores, then
 * works out energy, and each has its own pace.
 */
export class TimeLeft {
  private stage: JobProgress["stage"] | null = null;
  private startedMs = 0;
  private startedAt = 0;

  /** Null until there is a pace to speak of. `nowMs` only has to grow. */
  after(progress: Omit<JobProgress, "secondsLeft">, nowMs: number): number | null {
    const { stage, rowsRead, rowsTotal } = progress;
    if (stage !== this.stage) {
      this.stage = stage;
      this.startedMs = nowMs;
      this.startedAt = rowsRead;
    }
    const done = rowsRead - this.startedAt;
    const elapsedS = (nowMs - this.startedMs) / 1000;
    if (rowsTotal === null || done <= 0 || elapsedS < 0.2) return null;
    return Math.max(0, Math.ceil(((rowsTotal - rowsRead) / done) * elapsedS));
  }
}
