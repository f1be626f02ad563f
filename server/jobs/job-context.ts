import type { Transaction } from "sequelize";
import type { Database } from "@server/database/connect";
import type { FileStore } from "@server/files/file-store";
import type { JobProgress } from "@server/models/job";
import { JobDropped } from "./job-outcome";
import { finishJob, type ClaimedJob } from "./job-queue";

/** What a job's work gets to do it with. */
export interface JobContext {
  readonly database: Database;
  readonly files: FileStore;
  readonly job: ClaimedJob;
  /** Throws when the work is to stop; call it at least every few ten thousand rows. */
  checkpoint(): void;
  /** How far it is; shown, at most four times a second. */
  report(progress: Omit<JobProgress, "secondsLeft">): void;
  /** The last statement of the work's transaction: effects and end are committed together. */
  finish(transaction: Transaction): Promise<void>;
}

/** @throws JobDropped in `finish` where the job was cancelled or taken over meanwhile. */
export function finisher(database: Database, job: ClaimedJob, owner: string) {
  return async (transaction: Transaction): Promise<void> => {
    if (!(await finishJob(database, transaction, job.id, owner))) throw new JobDropped();
  };
}
