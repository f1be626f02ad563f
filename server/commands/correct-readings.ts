import type { Transaction } from "sequelize";
import type { CorrectionChange } from "@shared/contracts/corrections";
import { spansOverlap } from "@shared/domain/readings/corrections/correction-span";
import { inTransaction } from "@server/database/transaction";
import type { Context } from "@server/http/context";
import { Conflict } from "@server/http/errors";
import { enqueueJob, enqueueRecalculation } from "@server/jobs/job-queue";
import { Correction } from "@server/models/correction";
import { MeteringPoint } from "@server/models/metering-point";
import { touchedPoints } from "@server/queries/corrections/touched-points";
import { spanOfChange } from "@server/readings/point-corrections";
import type { Acting } from "./acting";
import { requireSound } from "./correction-rules";
import { recordAudit } from "./record-audit";

export type Correcting = Acting & Pick<Context, "services">;

/** Keeps a proposal and has its effect worked out; nothing changes before somebody applies it. */
export async function proposeCorrection(
  acting: Correcting,
  pointId: string,
  { change, reason }: { readonly change: CorrectionChange; readonly reason: string },
): Promise<Correction> {
  const { scope, actor, clock, database, services } = acting;
  const point = await scope.get(MeteringPoint, pointId, "metering point");
  await requireSound(acting, point.id, change);
  const row = await inTransaction(database, async (transaction) => {
    await requireFree(acting, point.id, change, transaction);
    const created = await scope.create(
      Correction,
      {
        proposedAtPointId: point.id,
        pointId: change.kind === "probeOffset" ? null : point.id,
        probeId: change.kind === "probeOffset" ? change.probeId : null,
        logFileId: "logFileId" in change ? change.logFileId : null,
        kind: change.kind,
        document: change,
        reason,
        state: "working",
        createdAt: clock.date(),
        createdByAccountId: actor.accountId,
        createdByName: actor.accountName,
      },
      { transaction },
    );
    await enqueueJob(database, transaction, {
      organisationId: scope.organisationId,
      pointId: point.id,
      correctionId: created.id,
      kind: "correction",
    });
    await audit(acting, "correction-proposed", created, { change, reason }, transaction);
    return created.reload({ transaction });
  });
  services.jobs.poke();
  return row;
}

/** From now on the readings are read with it; their energy follows in the background. */
export async function applyCorrection(acting: Correcting, id: string): Promise<Correction> {
  return change(acting, id, async (row, transaction) => {
    if (row.state !== "proposed") throw notApplicable(row);
    await requireFree(acting, row.proposedAtPointId, row.change, transaction);
    row.set({
      state: "applied",
      appliedAt: acting.clock.date(),
      appliedByName: acting.actor.accountName,
    });
    await recalculateTouched(acting, row, transaction);
    await audit(acting, "correction-applied", row, { effect: row.effect }, transaction);
  });
}

/** The readings are read without it again. It stays in the list, with why. */
export async function withdrawCorrection(
  acting: Correcting,
  id: string,
  reason: string,
): Promise<Correction> {
  return change(acting, id, async (row, transaction) => {
    if (row.state === "withdrawn") throw notApplicable(row);
    const wasApplied = row.state === "applied";
    row.set({
      state: "withdrawn",
      withdrawnAt: acting.clock.date(),
      withdrawnByName: acting.actor.accountName,
      withdrawnReason: reason,
    });
    if (wasApplied) await recalculateTouched(acting, row, transaction);
    await audit(acting, "correction-withdrawn", row, { reason }, transaction);
  });
}

/** Loads the correction under its lock, lets `work` change it and tells the job runner. */
async function change(
  acting: Correcting,
  id: string,
  work: (row: Correction, transaction: Transaction) => Promise<void>,
): Promise<Correction> {
  const row = await inTransaction(acting.database, async (transaction) => {
    const found = await acting.scope.get(Correction, id, "correction", {
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    await work(found, transaction);
    return found.save({ transaction });
  });
  acting.services.jobs.poke();
  return row;
}

async function recalculateTouched(
  { database, scope }: Acting,
  row: Correction,
  transaction: Transaction,
): Promise<void> {
  for (const pointId of await touchedPoints(database, row, transaction))
    await enqueueRecalculation(database, transaction, {
      organisationId: scope.organisationId,
      pointId,
    });
}

/**
 * Two corrections of one kind over the same time are taken for one made twice: a flow scaled twice, a
 * clock moved twice. Exclusions may overlap, because a row is left out once.
 */
async function requireFree(
  { scope }: Acting,
  pointId: string,
  wanted: CorrectionChange,
  transaction: Transaction,
): Promise<void> {
  if (wanted.kind === "exclude") return;
  const where =
    wanted.kind === "probeOffset"
      ? { probeId: wanted.probeId }
      : wanted.kind === "clock" || wanted.kind === "unit"
        ? { logFileId: wanted.logFileId }
        : { pointId };
  const standing = await scope.list(Correction, {
    where: { ...where, kind: wanted.kind, state: "applied" },
    transaction,
  });
  const rival = standing.find(({ change: other }) => meets(other, wanted));
  if (rival)
    throw new Conflict(
      "correction-overlaps",
      "A correction of this kind already applies to some of this time.",
      "Withdraw that one first, or choose a span beside it.",
    );
}

function meets(a: CorrectionChange, b: CorrectionChange): boolean {
  if (a.kind === "unit" && b.kind === "unit") return a.channel === b.channel;
  const [one, other] = [spanOfChange(a), spanOfChange(b)];
  return one === null || other === null || spansOverlap(one, other);
}

function notApplicable({ state }: Correction): Conflict {
  if (state === "working")
    return new Conflict(
      "correction-being-weighed",
      "What this correction would change is being worked out.",
      "Wait until its effect is there, look at it, then apply it.",
    );
  if (state === "applied")
    return new Conflict(
      "correction-applied",
      "This correction is applied already.",
      "Nothing needs to be done.",
    );
  if (state === "withdrawn")
    return new Conflict(
      "correction-withdrawn",
      "This correction was withdrawn.",
      "Propose it anew if it is right after all.",
    );
  return new Conflict(
    "correction-failed",
    "The effect of this correction could not be worked out.",
    "Withdraw it and propose it anew.",
  );
}

function audit(
  acting: Acting,
  kind: string,
  row: Correction,
  details: Record<string, unknown>,
  transaction: Transaction,
): Promise<void> {
  const about = { correction: row.kind, pointId: row.proposedAtPointId, ...details };
  const subject = { kind: "correction", id: row.id };
  return recordAudit(acting, { kind, subject, details: about }, transaction);
}
