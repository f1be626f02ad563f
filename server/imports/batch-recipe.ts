import type { Transaction } from "sequelize";
import type { Database } from "@server/database/connect";
import { ImportBatch } from "@server/models/import-batch";
import type { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import { Recipe } from "@server/models/recipe";
import { readLike, withRepairOf } from "./read-like";

/**
 * The batch's recipe on a file that has just been recognised, in the recognition's transaction. A
 * recipe deleted meanwhile leaves the file to be answered by hand.
 */
export async function applyBatchRecipe(
  database: Database,
  row: LogImport,
  file: LogFile,
  at: Date,
  transaction: Transaction,
): Promise<void> {
  const { batchId, organisationId } = row;
  if (batchId === null || file.appliedRecipe) return;
  const where = { id: batchId, organisationId };
  const batch = await ImportBatch.findOne({ where, transaction });
  if (batch === null || batch.recipeId === null) return;
  const saved = await Recipe.findOne({
    where: { id: batch.recipeId, organisationId },
    transaction,
  });
  if (saved === null) return;
  const by = { name: batch.createdByName, at };
  const read = await readLike(database, file, saved, by, transaction);
  if (read === null) return;
  await file.update(read, { transaction });
  row.repair = withRepairOf(row.repair, saved);
  await saved.update({ lastUsedAt: at }, { transaction });
}
