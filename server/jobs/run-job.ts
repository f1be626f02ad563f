import { setTimeout as sleep } from "node:timers/promises";
import { QueryTypes } from "sequelize";
import type { Database } from "@server/database/connect";
import { FileMissing, type FileStore } from "@server/files/file-store";
import { checkImportJob } from "@server/imports/check-import-job";
import { recogniseFileJob } from "@server/imports/recognise-file-job";
import { storeImportJob } from "@server/imports/store-import-job";
import { undoImportJob } from "@server/imports/undo-import-job";
import { unpackJob } from "@server/imports/unpack/unpack-job";
import type { JobKind, JobProgress } from "@server/models/job";
import type { Failure } from "@server/models/log-import";
import { correctionEffectJob } from "./correction-effect-job";
import { finisher, type JobContext } from "./job-context";
import {
  isDatabaseAway,
  JobDropped,
  JobHandedBack,
  JobRefused,
  type JobOutcome,
} from "./job-outcome";
import type { ClaimedJob } from "./job-queue";
import { recalculateJob } from "./recalculate-job";

const works: Record<JobKind, (context: JobContext) => Promise<void>> = {
  unpack: unpackJob,
  recognise: recogniseFileJob,
  check: checkImportJob,
  import: storeImportJob,
  undo: undoImportJob,
  recalculate: recalculateJob,
  correction: correctionEffectJob,
};

export interface JobSurroundings {
  readonly database: Database;
  readonly files: FileStore;
  readonly owner: string;
  /** Asked at every checkpoint. */
  wanted(): "go on" | "drop" | "hand back";
  onProgress(progress: Omit<JobProgress, "secondsLeft">): void;
}

/**
 * Does the work of one claimed job and says how it ended; never throws. While the database is away
 * it waits and begins again: nothing is kept outside transactions, so nothing is done twice.
 */
export async function runJob(job: ClaimedJob, around: JobSurroundings): Promise<JobOutcome> {
  const { database, files, owner } = around;
  const checkpoint = (): void => {
    const wanted = around.wanted();
    if (wanted === "drop") throw new JobDropped();
    if (wanted === "hand back") throw new JobHandedBack();
  };
  const context: JobContext = {
    database,
    files,
    job,
    checkpoint,
    report: around.onProgress,
    finish: finisher(database, job, owner),
  };
  for (;;) {
    try {
      await works[job.kind](context);
      return { kind: "done" };
    } catch (error) {
      if (!isDatabaseAway(error)) return outcomeOf(error);
    }
    try {
      const state = await untilBack(database, job.id, owner, checkpoint);
      if (state === "done") return { kind: "done" };
      if (state === "lost") return { kind: "dropped" };
    } catch (error) {
      return outcomeOf(error);
    }
  }
}

const missingFile: Failure = {
  code: "file-missing",
  detail: "The server no longer holds a file of this import.",
  remedy: "Upload the file again, or have the server's files restored from their backup.",
};

function outcomeOf(error: unknown): JobOutcome {
  if (error instanceof JobRefused) return { kind: "refused", failure: error.failure };
  if (error instanceof FileMissing) return { kind: "refused", failure: missingFile };
  if (error instanceof JobDropped) return { kind: "dropped" };
  if (error instanceof JobHandedBack) return { kind: "handedBack" };
  if (error instanceof Error) {
    const parent = "parent" in error && error.parent instanceof Error ? error.parent.message : "";
    return {
      kind: "error",
      message: error.message || parent || error.name,
      stack: error.stack ?? null,
    };
  }
  return { kind: "error", message: String(error), stack: null };
}

/** Waits for the database, then tells whether the job is still ours or was committed after all. */
async function untilBack(
  database: Database,
  id: string,
  owner: string,
  checkpoint: () => void,
): Promise<"ours" | "done" | "lost"> {
  for (;;) {
    checkpoint();
    try {
      const [row] = await database.query<{ state: string; owner: string | null }>(
        "SELECT state, lease_owner AS owner FROM job WHERE id = :id",
        { replacements: { id }, type: QueryTypes.SELECT },
      );
      if (row?.state === "done") return "done";
      return row?.state === "running" && row.owner === owner ? "ours" : "lost";
    } catch (error) {
      if (!isDatabaseAway(error)) throw error;
      await sleep(300);
    }
  }
}
