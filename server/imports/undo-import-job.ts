import { QueryTypes } from "sequelize";
import { databaseNow } from "@server/database/database-now";
import { inTransaction } from "@server/database/transaction";
import type { JobContext } from "@server/jobs/job-context";
import { LogFile } from "@server/models/log-file";
import { lockPoint, recalculateEnergy } from "@server/readings/recalculate-energy";
import { withdrawChosenCorrections } from "./findings/keep-corrections";
import { importOfJob } from "./load-files";
import { filesOf, move, settleImport } from "./settle-import";

/** Takes the readings of an import out again and works the energy of their time out anew. */
export async function undoImportJob(context: JobContext): Promise<void> {
  const { database, job } = context;
  await inTransaction(database, async (transaction) => {
    await lockPoint(database, transaction, job.pointId);
    const row = await importOfJob(context, transaction);
    const [span] = await database.query<{ firstMs: string | null; lastMs: string | null }>(
      `SELECT MIN(b.first_ms) AS firstMs, MAX(b.last_ms) AS lastMs
         FROM reading_block b JOIN log_file f ON f.id = b.log_file_id
        WHERE f.import_id = :importId`,
      { replacements: { importId: row.id }, type: QueryTypes.SELECT, transaction },
    );
    await database.query(
      `DELETE FROM reading_block WHERE point_id = :pointId
         AND log_file_id IN (SELECT id FROM log_file WHERE import_id = :importId)`,
      { replacements: { pointId: row.pointId, importId: row.id }, transaction },
    );
    const files = await filesOf(row, transaction);
    const { movedRows } = await withdrawChosenCorrections(transaction, row, {
      fileNames: files.map(({ name }) => name),
      now: await databaseNow(database, transaction),
    });
    if (span?.firstMs != null && span.lastMs !== null) {
      // A last mean reaches a step beyond its label; the recalculation's own reach covers that
      // while the file's step is still on its row.
      const range = { startMs: Number(span.firstMs), endMs: Number(span.lastMs) + 1 };
      // Rows whose clock was put right gave their energy elsewhere.
      await recalculateEnergy(database, transaction, row.pointId, movedRows ? null : range, {
        onProgress(share) {
          context.checkpoint();
          context.report({ stage: "energy", rowsRead: Math.round(share * 100), rowsTotal: 100 });
        },
      });
    }
    await LogFile.update(
      { precedence: null, seriesKind: null, nominalStepMs: null },
      { where: { importId: row.id }, transaction },
    );
    move(row, "undone");
    const { reopenWhenUndone } = row;
    row.set({ rowsStored: null, failure: null, reopenWhenUndone: false });
    await row.save({ transaction });
    if (reopenWhenUndone) await settleImport(database, transaction, row);
    await context.finish(transaction);
  });
}
