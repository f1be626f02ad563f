import type { z } from "zod";
import type { createBathCheck } from "@shared/contracts/evidence";
import { inTransaction } from "@server/database/transaction";
import { Conflict, Invalid } from "@server/http/errors";
import { BathCheck } from "@server/models/bath-check";
import { Instrument } from "@server/models/instrument";
import type { Acting } from "./acting";
import { recordAudit } from "./record-audit";

type NewBathCheck = z.output<(typeof createBathCheck)["body"]>;

/**
 * Keeps the paired readings of two probes in one bath. With `replaces`, the check named there stops
 * counting and stays readable; the probes must be the same two.
 * @throws Invalid for probes that are none; Conflict where the check was replaced before.
 */
export async function recordBathCheck(
  acting: Acting,
  { replaces, ...fields }: NewBathCheck,
): Promise<BathCheck> {
  const { scope, clock, actor } = acting;
  if (fields.firstProbeId === fields.secondProbeId)
    throw Invalid.field("secondProbeId", "same-probe", "A pair is two different probes.");
  return inTransaction(acting.database, async (transaction) => {
    for (const field of ["firstProbeId", "secondProbeId"] as const) {
      const where = { id: fields[field], kind: "probe" as const };
      if ((await scope.find(Instrument, { where, transaction })) === null)
        throw Invalid.field(field, "no-such-probe", "There is no such temperature probe.");
    }
    const now = clock.date();
    if (replaces !== undefined) {
      const before = await scope.get(BathCheck, replaces, "bath check", {
        transaction,
        lock: transaction.LOCK.UPDATE,
      });
      requireReplaceable(before, fields);
      await before.update({ supersededAt: now }, { transaction });
    }
    const check = await scope.create(
      BathCheck,
      {
        ...fields,
        bathUncertaintyK: fields.bathUncertaintyK ?? 0.01,
        notes: fields.notes || null,
        supersedesId: replaces ?? null,
        recordedAt: now,
        recordedByAccountId: actor.accountId,
        recordedByName: actor.accountName,
      },
      { transaction },
    );
    const { firstProbeId, secondProbeId, checkedOn } = fields;
    const details = { firstProbeId, secondProbeId, checkedOn, replaces: replaces ?? null };
    const subject = { kind: "bath-check", id: check.id };
    await recordAudit(acting, { kind: "bath-check-recorded", subject, details }, transaction);
    return check;
  });
}

function requireReplaceable(before: BathCheck, fields: NewBathCheck): void {
  if (before.supersededAt !== null)
    throw new Conflict(
      "superseded-already",
      "Another check stands in the place of this one.",
      "Correct the one that stands.",
    );
  const pair = [before.firstProbeId, before.secondProbeId].sort().join();
  if (pair !== [fields.firstProbeId, fields.secondProbeId].sort().join())
    throw Invalid.field("firstProbeId", "other-pair", "A correction is of the same two probes.");
}
