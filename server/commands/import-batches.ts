import { MAX_FILES_PER_BATCH, type BatchDetail } from "@shared/contracts/import-batches";
import { inTransaction } from "@server/database/transaction";
import type { Context } from "@server/http/context";
import { Conflict, HttpProblem, NotFound } from "@server/http/errors";
import { addFile, cancel, confirm, openImport } from "@server/imports/change-import";
import { findPoint } from "@server/imports/find-point";
import { isCancellable, isReopenable } from "@server/imports/import-states";
import { containerOfStored, type ReceivedFile } from "@server/imports/receive-log-file";
import { ImportBatch } from "@server/models/import-batch";
import { ImportBatchFile } from "@server/models/import-batch-file";
import { LogImport } from "@server/models/log-import";
import { batchPoints } from "@server/queries/batches/batch-points";
import { installedSerials } from "@server/queries/batches/installed-serials";
import { visibleRecipe } from "@server/queries/recipes";
import { recordAudit } from "./record-audit";
import { siteInUse } from "./site-in-use";

export async function openBatch(
  context: Context,
  { recipeId, siteId }: { readonly recipeId: string; readonly siteId: string },
): Promise<ImportBatch> {
  const { scope, actor, clock, database } = context;
  const recipe = await visibleRecipe(context, recipeId);
  return inTransaction(database, async (transaction) => {
    const site = await siteInUse(context, siteId, transaction);
    const row = await scope.create(
      ImportBatch,
      {
        siteId: site.id,
        recipeId: recipe.id,
        recipeName: recipe.name,
        createdByAccountId: actor.accountId,
        createdByName: actor.accountName,
        createdAt: clock.date(),
      },
      { transaction },
    );
    const subject = { kind: "import-batch", id: row.id };
    const details = { recipe: recipe.name, site: site.name };
    await recordAudit(context, { kind: "import-batch-opened", subject, details }, transaction);
    return row;
  });
}

/** Takes a file in; once its point is known it becomes an import of that point. */
export async function addBatchFile(
  context: Context,
  batch: ImportBatch,
  received: ReceivedFile,
): Promise<void> {
  const { scope, clock, services } = context;
  const serial =
    received.container === null
      ? await services.logs.serialOf(await services.files.localPath(received.sha256))
      : null;
  const points = await batchPoints(context, batch.siteId);
  const installed = serial === null ? [] : await installedSerials(scope, serial);
  const found = findPoint(received.name, installed, points);
  const { name, sha256, byteLength } = received;
  const file = await inTransaction(context.database, async (transaction) => {
    const lock = transaction.LOCK.UPDATE;
    await scope.get(ImportBatch, batch.id, "batch", { transaction, lock });
    const present = await scope.list(ImportBatchFile, {
      where: { batchId: batch.id },
      transaction,
    });
    requireRoom(present, sha256);
    return scope.create(
      ImportBatchFile,
      {
        batchId: batch.id,
        name,
        sha256,
        byteLength,
        uploadedAt: clock.date(),
        loggerSerial: serial,
        pointBy: found.by,
        pointAmbiguous: found.ambiguous,
      },
      { transaction },
    );
  });
  if (found.pointId !== null) await beginImport(context, batch, file, found.pointId, received);
}

function requireRoom(present: readonly ImportBatchFile[], sha256: string): void {
  if (present.length >= MAX_FILES_PER_BATCH)
    throw new Conflict(
      "too-many-files",
      `A batch takes up to ${MAX_FILES_PER_BATCH} files.`,
      "Import these and open another batch for the rest.",
    );
  const twin = present.find((file) => file.sha256 === sha256);
  if (twin)
    throw new Conflict(
      "file-already-there",
      `This batch already holds the same file, as ${twin.name}.`,
      "Leave it out.",
    );
}

async function beginImport(
  context: Context,
  batch: ImportBatch,
  file: ImportBatchFile,
  pointId: string,
  received: ReceivedFile,
): Promise<void> {
  const row = await openImport(context, pointId);
  // Before its file is there: the batch's recipe is put on as soon as that is recognised.
  await row.update({ batchId: batch.id });
  await file.update({ importId: row.id });
  await addFile(context, row.id, received);
}

async function load(
  context: Context,
  batch: ImportBatch,
  fileId: string,
): Promise<ImportBatchFile> {
  const file = await context.scope.get(ImportBatchFile, fileId, "file");
  if (file.batchId !== batch.id) throw new NotFound("file");
  return file;
}

/** Ends the import a file has been until now. @throws Conflict where its readings are stored */
async function leaveImport(context: Context, file: ImportBatchFile): Promise<void> {
  if (file.importId === null) return;
  const { state } = await context.scope.get(LogImport, file.importId, "import");
  if (state === "imported" || state === "importing")
    throw new Conflict(
      "file-imported",
      `${file.name} is ${state === "imported" ? "imported" : "being imported"}.`,
      "Open its import and undo it first.",
    );
  if (isCancellable(state) && !isReopenable(state)) await cancel(context, file.importId);
}

/** Somebody says which point a file belongs to, or that the one that was found is right. */
export async function choosePoint(
  context: Context,
  batch: ImportBatch,
  fileId: string,
  pointId: string,
): Promise<void> {
  const file = await load(context, batch, fileId);
  const points = await batchPoints(context, batch.siteId);
  if (!points.some(({ id }) => id === pointId)) throw new NotFound("metering point");
  const row =
    file.importId === null ? null : await context.scope.get(LogImport, file.importId, "import");
  if (row?.pointId !== pointId) {
    await leaveImport(context, file);
    const { name, sha256, byteLength } = file;
    const container = await containerOfStored(context.services.files, sha256);
    await beginImport(context, batch, file, pointId, { name, sha256, byteLength, container });
  }
  await file.update({ pointBy: "chosen", pointAmbiguous: false });
}

export async function removeFile(
  context: Context,
  batch: ImportBatch,
  fileId: string,
): Promise<void> {
  const file = await load(context, batch, fileId);
  await leaveImport(context, file);
  await file.destroy();
}

/** Confirms every import that is ready; one that is refused stays as it is, and says why. */
export async function confirmReady(
  context: Context,
  ready: readonly { readonly batchFileId: string; readonly importId: string }[],
): Promise<BatchDetail["refused"]> {
  const refused: BatchDetail["refused"] = [];
  for (const { batchFileId, importId } of ready) {
    try {
      await confirm(context, importId);
    } catch (error) {
      if (!(error instanceof HttpProblem)) throw error;
      refused.push({ batchFileId, detail: error.message, remedy: error.remedy });
    }
  }
  return refused;
}
