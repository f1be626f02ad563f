import { recordAudit } from "@server/commands/record-audit";
import { Conflict, Denied } from "@server/http/errors";
import { enqueueJob } from "@server/jobs/job-queue";
import { Job } from "@server/models/job";
import type { LogImport } from "@server/models/log-import";
import { can } from "@server/policies/can";
import { change, type Importing } from "./change-import";

/**
 * Takes the readings of an import out and, once they are out, goes back to its choices: the job that
 * undoes it settles it anew, so that nobody has to wait for the one before asking for the other.
 */
export async function changeChoices(context: Importing, importId: string): Promise<LogImport> {
  return change(context, importId, async (row, transaction) => {
    if (!can(context.actor).undoImport({ importedByAccountId: row.createdByAccountId }))
      throw new Denied("Only who made this import, or an administrator, changes it.");
    if (row.state !== "imported")
      throw new Conflict(
        "import-not-stored",
        `This import is ${row.state}: none of its readings are stored.`,
        "Change its choices as they are, or take it up again.",
      );
    const { organisationId, pointId } = row;
    const job = { organisationId, pointId, importId: row.id, kind: "undo" as const };
    const where = {
      organisationId,
      importId: row.id,
      kind: job.kind,
      state: ["queued", "running"],
    };
    if ((await Job.count({ where, transaction })) === 0)
      await enqueueJob(context.database, transaction, job);
    if (row.reopenWhenUndone) return;
    const undoneByName = context.actor.accountName;
    await row.update({ reopenWhenUndone: true, undoneByName }, { transaction });
    const subject = { kind: "import", id: row.id };
    await recordAudit(context, { kind: "import-changed", subject }, transaction);
  });
}
