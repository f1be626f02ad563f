import { recordAudit } from "@server/commands/record-audit";
import type { LogImport } from "@server/models/log-import";
import { change, queueUndo, type Importing } from "./change-import";

/**
 * Takes the readings of an import out and, once they are out, goes back to its choices: the job that
 * undoes it settles it anew, so that nobody has to wait for the one before asking for the other.
 */
export async function changeChoices(context: Importing, importId: string): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    const remedy = "Change its choices as they are, or take it up again.";
    await queueUndo(context, row, remedy, transaction);
    if (row.reopenWhenUndone) return;
    const undoneByName = context.actor.accountName;
    await row.update({ reopenWhenUndone: true, undoneByName }, { transaction });
    const subject = { kind: "import", id: row.id };
    await recordAudit(context, { kind: "import-changed", subject }, transaction);
  });
}
