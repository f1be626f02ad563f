import { recordAudit } from "@server/commands/record-audit";
import { Conflict } from "@server/http/errors";
import type { LogImport } from "@server/models/log-import";
import { visibleRecipe } from "@server/queries/recipes";
import { change, fileOf, requireEditable, type Importing } from "./change-import";
import { readLike, withRepairOf } from "./read-like";
import { settleImport, stopChecks } from "./settle-import";

/** Reads a file like a saved recipe says; what the file contradicts stays open. */
export async function applySavedRecipe(
  context: Importing,
  importId: string,
  fileId: string,
  recipeId: string,
): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    requireEditable(row);
    const file = await fileOf(context, row, fileId, transaction);
    const saved = await visibleRecipe(context, recipeId, transaction);
    const at = context.clock.date();
    const { accountName: name } = context.actor;
    const read = await readLike(context.database, file, saved, { name, at }, transaction);
    if (read === null)
      throw new Conflict(
        "file-not-recognised",
        file.unreadable ? "This file cannot be read at all." : "This file is still being read.",
        file.unreadable ? "Take it out and export the log anew." : "Wait until it is recognised.",
      );
    await stopChecks(context.database, transaction, row);
    await file.update(read, { transaction });
    row.repair = withRepairOf(row.repair, saved);
    await saved.update({ lastUsedAt: at }, { transaction });
    await settleImport(context.database, transaction, row);
    const subject = { kind: "import", id: row.id };
    const details = { file: file.name, recipe: saved.name, version: saved.version };
    await recordAudit(context, { kind: "recipe-applied", subject, details }, transaction);
  });
}
