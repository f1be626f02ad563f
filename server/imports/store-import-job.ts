import { QueryTypes, type Transaction } from "sequelize";
import { resolveSegments, type ReadingSource } from "@shared/domain/readings/resolve-segments";
import { DAY_MS, type Interval } from "@shared/domain/time/interval";
import { enqueueJob } from "@server/jobs/job-queue";
import { databaseNow } from "@server/database/database-now";
import { inTransaction } from "@server/database/transaction";
import type { JobContext } from "@server/jobs/job-context";
import { JobDropped, JobRefused } from "@server/jobs/job-outcome";
import { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import { loadEnergySettings } from "@server/readings/energy-settings";
import { loadSources, trimSegments } from "@server/readings/load-segments";
import { lockPoint, recalculateEnergy } from "@server/readings/recalculate-energy";
import { packBlocks, storeBlocks, type PackedBlock } from "@server/readings/store-blocks";
import { overlapsOf } from "./check-import";
import type { CheckedFile } from "./file-checks";
import { storeChosen } from "./findings/store-chosen";
import { sourcesOf, spanOf } from "./import-sources";
import { importOfJob, loadFile, openFiles } from "./load-files";
import { storedRowsOf } from "./resolved-file";
import { move } from "./settle-import";

/** A file ready to be stored: its rows as their logger wrote them are packed, the others in SI units. */
interface PackedFile extends CheckedFile {
  readonly blocks: readonly PackedBlock[];
}

/**
 * Stores the readings of an import and works out the energy they give, all in one transaction: a
 * kill at any moment leaves either nothing of it or all of it.
 */
export async function storeImportJob(context: JobContext): Promise<void> {
  const { database, job } = context;
  const row = await importOfJob(context);
  const { zone } = await loadEnergySettings(database, row.pointId);
  const { files, rows } = await openFiles(row);
  const loaded: PackedFile[] = [];
  for (const file of files) {
    const blocks: PackedBlock[] = [];
    const checked = await loadFile(context, file, row.repair, zone, rows, (written) => {
      for (const block of packBlocks(storedRowsOf(written))) {
        context.checkpoint();
        // A copy: what was packed lies in a buffer three times its size.
        blocks.push({ ...block, data: Buffer.from(block.data) });
      }
    });
    loaded.push({ ...checked, blocks });
  }
  for (const file of loaded) requireDecided(file);

  await inTransaction(database, async (transaction) => {
    await lockPoint(database, transaction, job.pointId);
    const outcome = await storeAll(context, transaction, row, files, loaded, rows.total);
    // Locked only now, so that somebody who cancels meanwhile need not wait; then this rolls back.
    const fresh = await importOfJob(context, transaction);
    if (fresh.state !== "importing") throw new JobDropped();
    if (outcome === "metAnother") await checkAgain(context, transaction, fresh);
    else await record(context, transaction, fresh, loaded);
    await context.finish(transaction);
  });
}

function requireDecided({ resolved, columns }: CheckedFile): void {
  if (resolved.columns !== null && columns !== null) return;
  throw new JobRefused({
    code: "import-undecided",
    detail: "A choice the import needs is not made.",
    remedy: "Take the import up again: its checks name what is to be chosen.",
  });
}

async function storeAll(
  context: JobContext,
  transaction: Transaction,
  row: LogImport,
  logFiles: readonly LogFile[],
  files: readonly PackedFile[],
  rowsTotal: number,
): Promise<"stored" | "metAnother"> {
  const { database } = context;
  const span = spanOf(files);
  const already = span ? await storedAround(context, transaction, row.pointId, span) : [];
  const precedence = await precedenceOf(context, transaction, row, files, already);
  if (precedence === null) return "metAnother";
  const settings = await loadEnergySettings(database, row.pointId, transaction);
  if (span !== null) {
    const finding = { database, transaction, row, logFiles, files, stored: already, precedence };
    const chosen = await storeChosen({
      ...finding,
      settings,
      span,
      onStep: context.checkpoint,
    });
    if (chosen === "undecided") return "metAnother";
  }
  let stored = 0;
  function* watched(blocks: readonly PackedBlock[]): Generator<PackedBlock> {
    for (const block of blocks) {
      context.checkpoint();
      context.report({ stage: "storing", rowsRead: stored, rowsTotal });
      yield block;
      stored += block.rowCount;
    }
  }
  for (const { fileId: logFileId, kind, resolved, blocks } of files) {
    const owner = { organisationId: row.organisationId, pointId: row.pointId, logFileId };
    await storeBlocks(transaction, owner, watched(blocks));
    await LogFile.update(
      { precedence, seriesKind: kind, nominalStepMs: resolved.nominalStepMs },
      { where: { id: logFileId }, transaction },
    );
  }
  context.report({ stage: "energy", rowsRead: 0, rowsTotal });
  if (span !== null) {
    const { meterPlace } = settings;
    const segments = resolveSegments([...already, ...sourcesOf(files, precedence, meterPlace)]);
    await recalculateEnergy(database, transaction, row.pointId, span, {
      segmentsOf: (fromMs, toMs) => trimSegments(segments, fromMs, toMs),
      onProgress(share) {
        context.checkpoint();
        context.report({ stage: "energy", rowsRead: Math.round(share * rowsTotal), rowsTotal });
      },
    });
  }
  return "stored";
}

/** Says on the import what was stored. */
async function record(
  context: JobContext,
  transaction: Transaction,
  row: LogImport,
  files: readonly CheckedFile[],
): Promise<void> {
  const rowsStored = files.reduce((sum, { columns }) => sum + (columns?.instantMs.length ?? 0), 0);
  const [firstInstant, lastInstant] = instantsOf(files);
  move(row, "stored");
  row.set({ rowsStored, firstInstant, lastInstant, failure: null });
  row.importedAt = await databaseNow(context.database, transaction);
  await row.save({ transaction });
}

/**
 * What other files hold of every local day the import touches, and of the steps that reach into
 * them: a day's energy is all of its readings'.
 */
function storedAround(
  { database }: JobContext,
  transaction: Transaction,
  pointId: string,
  span: Interval,
): Promise<ReadingSource[]> {
  const margin = 2 * DAY_MS;
  return loadSources(database, pointId, span.startMs - margin, span.endMs + margin, transaction);
}

/**
 * Which readings win where this import meets stored ones: above all others, or below all where the
 * earlier ones are kept. Null where it meets different readings that no choice was made about,
 * because another import was stored since the check.
 */
async function precedenceOf(
  { database }: JobContext,
  transaction: Transaction,
  row: LogImport,
  files: readonly CheckedFile[],
  already: readonly ReadingSource[],
): Promise<number | null> {
  const [found] = await database.query<{ least: number | null; greatest: number | null }>(
    `SELECT MIN(precedence) AS least, MAX(precedence) AS greatest
       FROM log_file WHERE point_id = :pointId AND precedence IS NOT NULL`,
    { replacements: { pointId: row.pointId }, type: QueryTypes.SELECT, transaction },
  );
  const above = (found?.greatest ?? 0) + 1;
  if (already.length === 0 && files.length < 2) return above;
  const differs = overlapsOf(files, already).some((overlap) => (overlap?.different.count ?? 0) > 0);
  if (!differs || row.repair.overlap === "useThis") return above;
  return row.repair.overlap === null ? null : (found?.least ?? 0) - 1;
}

/** The check of this import no longer holds, so that it must be made and confirmed again. */
async function checkAgain({ database }: JobContext, transaction: Transaction, row: LogImport) {
  row.revision += 1;
  row.checks = null;
  move(row, "metAnother");
  await row.save({ transaction });
  const { organisationId, pointId, id: importId, revision } = row;
  const job = { organisationId, pointId, importId, revision, kind: "check" as const };
  await enqueueJob(database, transaction, job);
}

function instantsOf(files: readonly CheckedFile[]): [Date | null, Date | null] {
  const known = (values: (number | null)[]) => values.filter((value) => value !== null);
  const firsts = known(files.map(({ resolved }) => resolved.firstInstantMs));
  const lasts = known(files.map(({ resolved }) => resolved.lastInstantMs));
  return firsts.length === 0
    ? [null, null]
    : [new Date(Math.min(...firsts)), new Date(Math.max(...lasts))];
}
