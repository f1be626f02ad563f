import type { Transaction } from "sequelize";
import type { z } from "zod";
import type { createInstallation, InstallationFields } from "@shared/contracts/evidence";
import { inTransaction } from "@server/database/transaction";
import { Conflict, Invalid } from "@server/http/errors";
import { Installation } from "@server/models/installation";
import { MeteringPoint } from "@server/models/metering-point";
import { columnsOf, completeFields } from "@server/queries/evidence/installation-fields";
import { requireUsableFields } from "@server/queries/evidence/require-usable-fields";
import { standingCorrections } from "@server/readings/point-corrections";
import type { Acting } from "./acting";
import { recalculateIfProbeCorrected } from "./recalculate-corrected";
import { recalculatePoint } from "./recalculate-points";
import { recordAudit } from "./record-audit";

type Given = z.output<(typeof createInstallation)["body"]>;

/**
 * Keeps how a point was measured. With `supersedes`, the version named there stops counting and
 * stays readable. Figures stored stay as they are, unless an applied offset follows one of its
 * probes: otherwise only their ± follows from it.
 * @throws Invalid for fields that contradict; Conflict for a version that no longer stands.
 */
export async function recordInstallation(
  acting: Acting,
  pointId: string,
  { supersedes, reason, ...given }: Given,
): Promise<Installation> {
  const { scope, clock, actor } = acting;
  const fields = completeFields(given);
  if (supersedes !== undefined && reason === undefined)
    throw Invalid.field("reason", "reason-needed", "Say why it is corrected.");
  return inTransaction(acting.database, async (transaction) => {
    // The point is locked, so two people cannot record the same start at once.
    const lock = transaction.LOCK.UPDATE;
    await scope.get(MeteringPoint, pointId, "metering point", { transaction, lock });
    await requireUsableFields(scope, fields, transaction);
    const carried = await carriesOffset(acting, pointId, transaction);
    const now = clock.date();
    const before =
      supersedes === undefined ? null : await standing(acting, pointId, supersedes, transaction);
    await before?.update({ supersededAt: now }, { transaction });
    await requireOwnStart(acting, pointId, fields, transaction);
    const row = await scope.create(
      Installation,
      {
        ...columnsOf(fields),
        pointId,
        version: (before?.version ?? 0) + 1,
        supersedesId: before?.id ?? null,
        reason: before ? (reason ?? null) : null,
        recordedAt: now,
        recordedByAccountId: actor.accountId,
        recordedByName: actor.accountName,
      },
      { transaction },
    );
    const kind = before ? "installation-corrected" : "installation-recorded";
    const details = { pointId, startsAt: fields.startsAt, supersedes: before?.id ?? null, reason };
    const subject = { kind: "installation", id: row.id };
    await recalculateIfProbeCorrected(acting, pointId, transaction);
    await recordAudit(acting, { kind, subject, details }, transaction);
    if (carried || (await carriesOffset(acting, pointId, transaction)))
      await recalculatePoint(acting, pointId, transaction);
    return row;
  });
}

/** Whether an applied correction of a probe touches the point, as its installations stand now. */
async function carriesOffset(
  { database }: Acting,
  pointId: string,
  transaction: Transaction,
): Promise<boolean> {
  const standing = await standingCorrections(database, pointId, transaction);
  return standing.some(({ change }) => change.kind === "probeOffset");
}

/** Takes an installation out of use, such as one recorded on the wrong point. */
export async function withdrawInstallation(
  acting: Acting,
  installationId: string,
  reason: string,
): Promise<Installation> {
  return inTransaction(acting.database, async (transaction) => {
    const row = await standing(acting, null, installationId, transaction);
    const carried = await carriesOffset(acting, row.pointId, transaction);
    await row.update(
      {
        withdrawnAt: acting.clock.date(),
        withdrawnByName: acting.actor.accountName,
        withdrawnReason: reason,
      },
      { transaction },
    );
    await recalculateIfProbeCorrected(acting, row.pointId, transaction);
    const subject = { kind: "installation", id: row.id };
    const details = { pointId: row.pointId, reason };
    await recordAudit(acting, { kind: "installation-withdrawn", subject, details }, transaction);
    if (carried) await recalculatePoint(acting, row.pointId, transaction);
    return row;
  });
}

async function standing(
  { scope }: Acting,
  pointId: string | null,
  installationId: string,
  transaction: Transaction,
): Promise<Installation> {
  const row = await scope.get(Installation, installationId, "installation", {
    ...(pointId === null ? {} : { where: { pointId } }),
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (row.stands) return row;
  throw row.withdrawnAt === null
    ? new Conflict(
        "superseded-already",
        "A later version stands in the place of this one.",
        "Open the point's evidence again and correct the version that stands.",
      )
    : new Conflict(
        "withdrawn-already",
        "This installation was withdrawn.",
        "Record a new one instead.",
      );
}

/** Two installations that start together would leave it open which of them speaks. */
async function requireOwnStart(
  { scope }: Acting,
  pointId: string,
  { startsAt }: InstallationFields,
  transaction: Transaction,
): Promise<void> {
  const where = {
    pointId,
    startsAt: new Date(startsAt),
    supersededAt: null,
    withdrawnAt: null,
  };
  if ((await scope.count(Installation, { where, transaction })) > 0)
    throw Invalid.field(
      "startsAt",
      "start-taken",
      "Another installation of this point starts at this time: correct that one instead.",
    );
}
