import type { Transaction } from "sequelize";
import { Conflict } from "@server/http/errors";
import type { Database } from "@server/database/connect";
import { cancelJobs, enqueueJob } from "@server/jobs/job-queue";
import { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import { nextState, type ImportEvent } from "./import-states";

/**
 * Moves an import on.
 * @throws Conflict where its state does not allow that.
 */
export function move(row: LogImport, event: ImportEvent): void {
  const next = nextState(row.state, event);
  if (next === null) {
    throw new Conflict(
      "import-state",
      `This import is ${row.state} and cannot do that now.`,
      "Load it again: it may have moved on meanwhile.",
    );
  }
  row.state = next;
}

/** Files of an import in the order they came. */
export function filesOf(row: LogImport, transaction?: Transaction): Promise<LogFile[]> {
  return LogFile.findAll({
    where: { importId: row.id, organisationId: row.organisationId },
    order: [["id", "ASC"]],
    transaction,
  });
}

/** Queues what finds out how a file is written: unpacking first, where it came inside something else. */
export async function enqueueReading(
  database: Database,
  transaction: Transaction,
  file: LogFile,
): Promise<void> {
  const { organisationId, pointId, importId, id: logFileId } = file;
  await enqueueJob(database, transaction, {
    organisationId,
    kind: file.isPacked ? "unpack" : "recognise",
    pointId,
    importId,
    logFileId,
  });
}

const isRecognised = (file: LogFile) => file.recognition !== null || file.unreadable !== null;
const isAnswered = (file: LogFile) =>
  file.unreadable === null && (file.questions ?? []).length === 0;

/**
 * Brings an import whose files or choices have changed to where it now stands: waiting for
 * recognition, asking, or checking with a check queued. What an older check found goes.
 */
export async function settleImport(
  database: Database,
  transaction: Transaction,
  row: LogImport,
): Promise<void> {
  const files = await filesOf(row, transaction);
  row.revision += 1;
  row.checks = null;
  row.failure = null;
  if (files.length === 0) move(row, "emptied");
  else if (!files.every(isRecognised)) move(row, "filesWait");
  else if (!files.every(isAnswered)) move(row, "questionsOpen");
  else {
    move(row, "checkQueued");
    await enqueueJob(database, transaction, {
      organisationId: row.organisationId,
      kind: "check",
      pointId: row.pointId,
      importId: row.id,
      revision: row.revision,
    });
  }
  await row.save({ transaction });
}

/** Stops the check of choices that are about to change; recognition of other files goes on. */
export async function stopChecks(
  database: Database,
  transaction: Transaction,
  row: LogImport,
): Promise<void> {
  if (row.state === "checking") await cancelJobs(database, transaction, { importId: row.id });
}
