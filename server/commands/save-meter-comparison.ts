import type { Transaction } from "sequelize";
import type { MeterComparisonInput } from "@shared/contracts/meter-comparisons";
import { inTransaction } from "@server/database/transaction";
import { Conflict } from "@server/http/errors";
import { MeterComparison } from "@server/models/meter-comparison";
import { Site } from "@server/models/site";
import { workOutComparison } from "@server/queries/comparisons/work-out-comparison";
import type { Acting } from "./acting";
import { recordAudit } from "./record-audit";
import { siteInUse } from "./site-in-use";

interface Given extends MeterComparisonInput {
  readonly supersedes?: string | undefined;
}

/**
 * Works a comparison out and keeps it as it came out. With `supersedes`, the one named there stops
 * counting and stays readable; both are of one site.
 * @throws Invalid for what cannot be compared; Conflict where the earlier one no longer stands or the
 *   site is archived.
 */
export async function saveMeterComparison(
  acting: Acting,
  siteId: string,
  { supersedes, ...input }: Given,
): Promise<MeterComparison> {
  const { scope, clock, actor, database } = acting;
  const site = await scope.get(Site, siteId, "site");
  const nowMs = clock.now();
  const { range, result } = await workOutComparison({ database, scope, nowMs }, site, input);
  return inTransaction(database, async (transaction) => {
    await siteInUse(acting, siteId, transaction);
    const before =
      supersedes === undefined ? null : await standing(acting, supersedes, transaction, siteId);
    const now = clock.date();
    await before?.update({ supersededAt: now }, { transaction });
    const row = await scope.create(
      MeterComparison,
      {
        siteId,
        title: input.title,
        fromAt: new Date(range.startMs),
        toAt: new Date(range.endMs),
        input,
        result,
        supersedesId: before?.id ?? null,
        recordedAt: now,
        recordedByAccountId: actor.accountId,
        recordedByName: actor.accountName,
      },
      { transaction },
    );
    const kind = before ? "meter-comparison-corrected" : "meter-comparison-saved";
    const { verdict, energy } = result;
    const consentBy = input.standIn?.consentBy ?? null;
    const details = { siteId, title: input.title, verdict, en: energy.en, supersedes, consentBy };
    await recordAudit(acting, { kind, subject: subjectOf(row), details }, transaction);
    return row;
  });
}

/** Takes a comparison out of use, such as one with the reads of another meter. */
export async function withdrawMeterComparison(
  acting: Acting,
  meterComparisonId: string,
  reason: string,
): Promise<MeterComparison> {
  return inTransaction(acting.database, async (transaction) => {
    const row = await standing(acting, meterComparisonId, transaction);
    await row.update(
      {
        withdrawnAt: acting.clock.date(),
        withdrawnByName: acting.actor.accountName,
        withdrawnReason: reason,
      },
      { transaction },
    );
    const details = { siteId: row.siteId, title: row.title, reason };
    const entry = { kind: "meter-comparison-withdrawn", subject: subjectOf(row), details };
    await recordAudit(acting, entry, transaction);
    return row;
  });
}

function subjectOf({ id }: MeterComparison) {
  return { kind: "meter-comparison", id };
}

async function standing(
  { scope }: Acting,
  id: string,
  transaction: Transaction,
  siteId?: string,
): Promise<MeterComparison> {
  const row = await scope.get(MeterComparison, id, "comparison", {
    ...(siteId === undefined ? {} : { where: { siteId } }),
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (row.state === "stands") return row;
  throw row.state === "superseded"
    ? new Conflict(
        "superseded-already",
        "A later comparison stands in the place of this one.",
        "Open the one that stands and correct that.",
      )
    : new Conflict(
        "withdrawn-already",
        "This comparison was withdrawn.",
        "Save a new one instead.",
      );
}
