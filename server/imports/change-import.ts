import { Op, type Transaction } from "sequelize";
import { MAX_FILES_PER_IMPORT } from "@shared/contracts/imports";
import { isCounter } from "@shared/domain/log-files/column-units";
import {
  DEFAULT_REPAIR_CHOICES,
  type FileRecipe,
  type RepairChoices,
} from "@shared/domain/log-files/recipe";
import type { Acting } from "@server/commands/acting";
import { recordAudit } from "@server/commands/record-audit";
import { inTransaction } from "@server/database/transaction";
import type { Context } from "@server/http/context";
import { Conflict, Denied, Invalid, NotFound } from "@server/http/errors";
import { cancelJobs, enqueueJob } from "@server/jobs/job-queue";
import { Job } from "@server/models/job";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { MeteringPoint } from "@server/models/metering-point";
import { can } from "@server/policies/can";
import { loadEnergySettings } from "@server/readings/energy-settings";
import { isCancellable, isEditable, isReopenable } from "./import-states";
import { settleFindings } from "./findings/settle-findings";
import { questionsLeftBy } from "./open-questions";
import { boresOf } from "./point-bores";
import type { ReceivedFile } from "./receive-log-file";
import { recipeProblems } from "./recipe-problems";
import { enqueueReading, filesOf, move, settleImport, stopChecks } from "./settle-import";

/** What a change of an import needs; an HTTP request has it, and so has the seeding of the demo. */
export type Importing = Acting & Pick<Context, "services">;

/** Opens an import for a point in use. */
export async function openImport(context: Importing, pointId: string): Promise<LogImport> {
  const { scope, actor, clock, database } = context;
  const point = await scope.get(MeteringPoint, pointId, "metering point");
  if (point.archivedAt !== null)
    throw new Conflict(
      "point-archived",
      "This metering point is archived.",
      "Take it back into use before bringing in readings.",
    );
  return inTransaction(database, async (transaction) => {
    const row = await scope.create(
      LogImport,
      {
        pointId,
        state: "open",
        repair: DEFAULT_REPAIR_CHOICES,
        createdByAccountId: actor.accountId,
        createdByName: actor.accountName,
        createdAt: clock.date(),
      },
      { transaction },
    );
    await audit(context, "import-opened", row, {}, transaction);
    // What was not given is null in the database and missing here: read it back.
    return row.reload({ transaction });
  });
}

/** Loads the import under its lock, lets `work` change it and tells the job runner. */
export async function change(
  context: Importing,
  importId: string,
  work: (row: LogImport, transaction: Transaction) => Promise<void>,
): Promise<LogImport> {
  const row = await inTransaction(context.database, async (transaction) => {
    const found = await context.scope.get(LogImport, importId, "import", {
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    await work(found, transaction);
    return found;
  });
  context.services.jobs.poke();
  return row;
}

export function requireEditable(row: LogImport): void {
  if (isEditable(row.state)) return;
  throw new Conflict(
    "import-not-editable",
    `This import is ${row.state}: its files and choices cannot change now.`,
    isReopenable(row.state) ? "Take it up again first." : "Undo it first, then change it.",
  );
}

export async function addFile(
  context: Importing,
  importId: string,
  received: ReceivedFile,
): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    requireEditable(row);
    const present = await filesOf(row, transaction);
    if (present.length >= MAX_FILES_PER_IMPORT)
      throw new Conflict(
        "too-many-files",
        `An import takes up to ${MAX_FILES_PER_IMPORT} files.`,
        "Finish this import and open another one for the rest.",
      );
    const twin = present.find(({ sha256, sourceSha256 }) =>
      [sha256, sourceSha256].includes(received.sha256),
    );
    if (twin)
      throw new Conflict(
        "file-already-there",
        `This import already holds the same file, as ${twin.sourceName ?? twin.name}.`,
        "Choose another file, or go on with this one.",
      );
    await stopChecks(context.database, transaction, row);
    const { container, ...stored } = received;
    // A workbook is a zip archive as well: unpacking tells them apart.
    const source = container && {
      sourceKind: container,
      sourceSha256: stored.sha256,
      sourceName: stored.name,
      sourceByteLength: stored.byteLength,
      member: null,
    };
    const file = await context.scope.create(
      LogFile,
      {
        importId: row.id,
        pointId: row.pointId,
        uploadedAt: context.clock.date(),
        ...stored,
        ...(source ?? {}),
      },
      { transaction },
    );
    await enqueueReading(context.database, transaction, file);
    await settleImport(context.database, transaction, row);
    const details = { name: file.name, sha256: file.sha256, bytes: file.byteLength };
    await audit(context, "log-file-added", row, details, transaction);
  });
}

export async function fileOf(
  context: Importing,
  row: LogImport,
  fileId: string,
  transaction: Transaction,
): Promise<LogFile> {
  const file = await context.scope.get(LogFile, fileId, "file", { transaction });
  if (file.importId !== row.id) throw new NotFound("file");
  return file;
}

export async function removeFile(
  context: Importing,
  importId: string,
  fileId: string,
): Promise<LogImport> {
  const changed = await change(context, importId, async (row, transaction) => {
    requireEditable(row);
    const file = await fileOf(context, row, fileId, transaction);
    const { id: ofImport } = row;
    await cancelJobs(context.database, transaction, { importId: ofImport, logFileId: fileId });
    await stopChecks(context.database, transaction, row);
    await file.destroy({ transaction });
    await settleImport(context.database, transaction, row);
    await audit(context, "log-file-removed", row, { name: file.name }, transaction);
  });
  context.services.jobs.dropImport(importId);
  return changed;
}

/** Sets how a file is read; the import goes on by itself once nothing is left to ask. */
export async function giveRecipe(
  context: Importing,
  importId: string,
  fileId: string,
  recipe: FileRecipe,
): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    requireEditable(row);
    const file = await fileOf(context, row, fileId, transaction);
    const { recognition } = file;
    if (file.recipe !== null && isReadAnew(file.recipe, recipe)) {
      await stopChecks(context.database, transaction, row);
      await recogniseAnew(context, row, file, recipe, transaction);
      await settleImport(context.database, transaction, row);
      await audit(context, "recipe-chosen", row, { file: file.name, recipe }, transaction);
      return;
    }
    if (recognition === null)
      throw new Conflict(
        "file-not-recognised",
        file.unreadable ? "This file cannot be read at all." : "This file is still being read.",
        file.unreadable ? "Take it out and export the log anew." : "Wait until it is recognised.",
      );
    const problems = recipeProblems(recipe, recognition);
    if (problems.length > 0) throw new Invalid(problems);
    await stopChecks(context.database, transaction, row);
    const { service } = await loadEnergySettings(context.database, row.pointId, transaction);
    const hasBore = (await boresOf(row.pointId, transaction)).length > 0;
    const questions = questionsLeftBy(recipe, recognition, { service, hasBore });
    await file.update({ recipe: withMeter(recipe), questions }, { transaction });
    await settleImport(context.database, transaction, row);
    await audit(context, "recipe-chosen", row, { file: file.name, recipe }, transaction);
  });
}

/** A permanent meter's file says so in its recipe, which is how its readings are found again. */
function withMeter(recipe: FileRecipe): FileRecipe {
  const isMetered = recipe.columns.some(({ meaning }) => meaning === "power" || isCounter(meaning));
  if (!isMetered || recipe.meter) return recipe;
  return { ...recipe, meter: { positivePower: null, exchangedAt: [] } };
}

/** Another encoding, separator, column boundary or header line: what the columns are must be found out again. */
function isReadAnew({ dialect: before }: FileRecipe, { dialect: after }: FileRecipe): boolean {
  const sameColumns = String(before.columnStarts) === String(after.columnStarts);
  const names = ["encoding", "separator", "headerLine"] as const;
  return !sameColumns || names.some((name) => before[name] !== after[name]);
}

async function recogniseAnew(
  { database }: Importing,
  row: LogImport,
  file: LogFile,
  recipe: FileRecipe,
  transaction: Transaction,
): Promise<void> {
  await cancelJobs(database, transaction, { importId: row.id, logFileId: file.id });
  await file.update(
    { recipe, recognition: null, questions: null, unreadable: null, appliedRecipe: null },
    { transaction },
  );
  await enqueueReading(database, transaction, file);
}

export async function giveRepairs(
  context: Importing,
  importId: string,
  choices: Partial<RepairChoices>,
): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    requireEditable(row);
    const files = await filesOf(row, transaction);
    const settled = settleFindings(row, files, choices);
    await stopChecks(context.database, transaction, row);
    row.repair = settled.repair;
    for (const [file, recipe] of settled.recipes) await file.update({ recipe }, { transaction });
    await settleImport(context.database, transaction, row);
    await audit(context, "repairs-chosen", row, { choices }, transaction);
  });
}

/** Checks again. One that is under way already serves; one that is refused says what is open. */
export async function startCheck(context: Importing, importId: string): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    if (row.state === "checking") return;
    requireEditable(row);
    const files = await filesOf(row, transaction);
    const open = files.find(({ questions }) => (questions ?? []).length > 0);
    const unread = files.find(({ recognition }) => recognition === null);
    if (files.length === 0) throw new Conflict("no-file", "There is no file yet.", "Add one.");
    if (unread)
      throw new Conflict(
        "file-not-recognised",
        `${unread.name} ${unread.unreadable ? "cannot be read" : "is still being read"}.`,
        unread.unreadable ? "Take it out of the import." : "Wait until it is recognised.",
      );
    if (open)
      throw new Conflict(
        "questions-open",
        `${open.name} still has a question that only you can answer.`,
        "Give its recipe with every answer; the import names the questions.",
      );
    await settleImport(context.database, transaction, row);
  });
}

/** Starts storing. @throws Conflict while anything is undecided or the same file is in already. */
export async function confirm(context: Importing, importId: string): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    if (row.state !== "ready")
      throw new Conflict(
        row.state === "asking" ? "choices-open" : "import-not-ready",
        row.state === "asking"
          ? "A question or a choice of this import is still open."
          : `This import is ${row.state}, not ready to be stored.`,
        "Make every choice, let the check pass, then confirm.",
      );
    const [twin] = await sameFiles(row, await filesOf(row, transaction), transaction);
    if (twin)
      throw new Conflict(
        "same-file-imported",
        `${twin.file.name} is stored already: it came in as ${twin.earlier.name}.`,
        "Undo the earlier import first, or leave this file out.",
      );
    move(row, "confirmed");
    row.failure = null;
    row.confirmedByAccountId = context.actor.accountId;
    row.confirmedByName = context.actor.accountName;
    await row.save({ transaction });
    const { organisationId, pointId } = row;
    const job = { organisationId, pointId, importId: row.id, kind: "import" as const };
    await enqueueJob(context.database, transaction, job);
    await audit(context, "import-confirmed", row, { repair: row.repair }, transaction);
  });
}

/**
 * Files whose bytes are stored for the same point already, each with the earlier file. What came from
 * the same place in the same upload is the same, even if it was turned into text another way.
 */
export async function sameFiles(
  row: LogImport,
  files: readonly LogFile[],
  transaction?: Transaction,
): Promise<{ file: LogFile; earlier: LogFile }[]> {
  if (files.length === 0) return [];
  const sources = files.flatMap(({ sourceSha256 }) => sourceSha256 ?? []);
  const earlier = await LogFile.findAll({
    where: {
      organisationId: row.organisationId,
      pointId: row.pointId,
      [Op.or]: [{ sha256: files.map(({ sha256 }) => sha256) }, { sourceSha256: sources }],
      importId: { [Op.ne]: row.id },
      precedence: { [Op.ne]: null },
    },
    transaction,
  });
  return files.flatMap((file) => {
    const twin = earlier.find(
      ({ sha256, sourceSha256, member }) =>
        sha256 === file.sha256 ||
        (file.member !== null && sourceSha256 === file.sourceSha256 && member === file.member),
    );
    return twin ? [{ file, earlier: twin }] : [];
  });
}

export async function cancel(context: Importing, importId: string): Promise<LogImport> {
  const changed = await change(context, importId, async (row, transaction) => {
    if (!isCancellable(row.state))
      throw new Conflict(
        "import-not-cancellable",
        `This import is ${row.state}: there is nothing to stop.`,
        row.state === "imported" ? "Undo it to take its readings out." : "Leave it as it is.",
      );
    await cancelJobs(context.database, transaction, { importId: row.id });
    move(row, "cancelled");
    await row.save({ transaction });
    await audit(context, "import-cancelled", row, {}, transaction);
  });
  context.services.jobs.dropImport(importId);
  return changed;
}

/**
 * Queues the job that takes the readings of an import out again; false where one is on its way.
 * @throws Denied, or Conflict with `remedy` where none of its readings are stored.
 */
export async function queueUndo(
  context: Importing,
  row: LogImport,
  remedy: string,
  transaction: Transaction,
): Promise<boolean> {
  if (!can(context.actor).undoImport({ importedByAccountId: row.createdByAccountId }))
    throw new Denied("Only who made this import, an engineer or an administrator undoes it.");
  if (row.state !== "imported")
    throw new Conflict(
      "import-not-stored",
      `This import is ${row.state}: none of its readings are stored.`,
      remedy,
    );
  const { organisationId, pointId } = row;
  const job = { organisationId, pointId, importId: row.id, kind: "undo" as const };
  const state = ["queued", "running"];
  const where = { organisationId, importId: row.id, kind: job.kind, state };
  if ((await Job.count({ where, transaction })) > 0) return false;
  await enqueueJob(context.database, transaction, job);
  return true;
}

export async function startUndo(context: Importing, importId: string): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    if (!(await queueUndo(context, row, "There is nothing to undo.", transaction))) return;
    await row.update({ undoneByName: context.actor.accountName }, { transaction });
    await audit(context, "import-undone", row, {}, transaction);
  });
}

/** Takes an import up again that ended without readings; files and choices are still there. */
export async function reopen(context: Importing, importId: string): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    if (!isReopenable(row.state))
      throw new Conflict(
        "import-not-reopenable",
        `This import is ${row.state} and cannot be taken up again.`,
        row.state === "imported" ? "Undo it first." : "Go on with it as it is.",
      );
    for (const file of await filesOf(row, transaction)) {
      if (file.recognition !== null || file.unreadable !== null) continue;
      await enqueueReading(context.database, transaction, file);
    }
    await settleImport(context.database, transaction, row);
    await audit(context, "import-reopened", row, {}, transaction);
  });
}

function audit(
  context: Importing,
  kind: string,
  row: LogImport,
  details: Record<string, unknown>,
  transaction: Transaction,
): Promise<void> {
  const subject = { kind: "import", id: row.id };
  return recordAudit(context, { kind, subject, details }, transaction);
}
