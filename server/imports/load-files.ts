import type { Transaction } from "sequelize";
import type { WrittenRows } from "@shared/domain/log-files/resolve-rows";
import type { RepairChoices } from "@shared/domain/log-files/recipe";
import type { JobContext } from "@server/jobs/job-context";
import { JobDropped } from "@server/jobs/job-outcome";
import type { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import type { CheckedFile } from "./file-checks";
import { boresOf } from "./point-bores";
import { readLogFile, type RowsSoFar } from "./read-log-file";
import { resolveFile } from "./resolved-file";
import { filesOf } from "./settle-import";

/** The job's import, locked against people's changes when a transaction is given. */
export async function importOfJob(
  { job }: JobContext,
  transaction?: Transaction,
): Promise<LogImport> {
  const lock = transaction?.LOCK.UPDATE;
  const row =
    job.importId === null
      ? null
      : await LogImport.findOne({ where: { id: job.importId }, transaction, lock });
  if (row === null) throw new JobDropped();
  return row;
}

export async function openFiles(row: LogImport): Promise<{ files: LogFile[]; rows: RowsSoFar }> {
  const files = await filesOf(row);
  const total = files.reduce((sum, file) => sum + (file.recognition?.dataRowCount ?? 0), 0);
  return { files, rows: { read: 0, total } };
}

/**
 * Reads one file of an import by its recipe and resolves it by the import's choices.
 * @param onWritten given the rows as the file has them; nothing of them may be kept
 */
export async function loadFile(
  context: JobContext,
  file: LogFile,
  choices: RepairChoices,
  zone: string,
  rows: RowsSoFar,
  onWritten: (written: WrittenRows) => void = () => undefined,
): Promise<CheckedFile> {
  const raw = await readLogFile(context, file, rows);
  const { recipe } = file;
  if (recipe === null) throw new JobDropped();
  const needsBore = recipe.columns.some(({ meaning }) => meaning === "velocity");
  const bores = needsBore ? await boresOf(file.pointId) : [];
  const inPlace = { onStep: context.checkpoint, onWritten };
  return {
    ...resolveFile(file.id, raw, recipe, choices, zone, { bores }, inPlace),
    recipe,
    firstRawLine: raw.line[0] ?? null,
    findings: file.recognition,
  };
}
