import { QueryTypes, type Transaction } from "sequelize";
import type { z } from "zod";
import type {
  createPoint as createContract,
  Pipe,
  updatePoint as updateContract,
} from "@shared/contracts/places";
import { inTransaction } from "@server/database/transaction";
import { Conflict } from "@server/http/errors";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { ChannelBit } from "@server/readings/stored-rows";
import { changesOf, recordPlaceEvent, type Acting } from "./acting";
import { keepBoreVersion } from "./keep-bore-version";
import { requireParent } from "./parent-rules";
import { namingFields } from "./place-names";
import { recalculatePoint } from "./recalculate-points";

type NewPoint = z.output<(typeof createContract)["body"]>;
type PointChanges = z.output<(typeof updateContract)["body"]>;

async function requireFeedingPoint(
  { scope }: Acting,
  loopId: string,
  pointId: string | null,
  parentPointId: string,
  transaction: Transaction,
): Promise<void> {
  const points = await scope.list(MeteringPoint, {
    where: { loopId },
    attributes: ["id", "parentPointId", "archivedAt"],
    transaction,
  });
  const siblings = points.map(({ id, parentPointId: parentId, archivedAt }) => ({
    id,
    parentId,
    inUse: archivedAt === null,
  }));
  const rule = { field: "parentPointId", thing: "point", whole: "loop" } as const;
  requireParent(siblings, pointId, parentPointId, rule);
}

/** The loop is locked, so codes and parents of its points cannot change under the checks. */
async function lockLoop({ scope }: Acting, loopId: string, transaction: Transaction) {
  return scope.get(Loop, loopId, "loop", { transaction, lock: transaction.LOCK.UPDATE });
}

export async function createPoint(
  acting: Acting,
  loopId: string,
  { pipe, ...fields }: NewPoint,
): Promise<MeteringPoint> {
  return inTransaction(acting.database, async (transaction) => {
    const loop = await lockLoop(acting, loopId, transaction);
    if (loop.archivedAt !== null)
      throw new Conflict(
        "loop-archived",
        `${loop.tag} is archived, so no point can be added to it.`,
        "Restore the loop first.",
      );
    if (fields.parentPointId)
      await requireFeedingPoint(acting, loopId, null, fields.parentPointId, transaction);
    const values = {
      ...fields,
      loopId,
      parentPointId: fields.parentPointId ?? null,
      notes: fields.notes || null,
      createdAt: acting.clock.date(),
    };
    const point = await namingFields(() =>
      acting.scope.create(MeteringPoint, values, { transaction }),
    );
    if (pipe) await keepBoreVersion(acting, point.id, pipe, transaction);
    await recordPlaceEvent(
      acting,
      { kind: "point", id: point.id },
      "created",
      { loopId, code: point.code, meterSide: point.meterSide },
      transaction,
    );
    return point;
  });
}

/**
 * Changes, archives or restores a metering point. Another meter side changes the density its energy
 * is worked out with and another gap rule the time it covers, so that is recalculated; another pipe
 * becomes a dated version of its bore, which also bounds what a counter there can have counted.
 */
export async function updatePoint(
  acting: Acting,
  pointId: string,
  { archived, pipe, ...fields }: PointChanges,
): Promise<MeteringPoint> {
  return inTransaction(acting.database, async (transaction) => {
    const { loopId } = await acting.scope.get(MeteringPoint, pointId, "point", { transaction });
    await lockLoop(acting, loopId, transaction);
    const point = await acting.scope.get(MeteringPoint, pointId, "point", {
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (fields.parentPointId && fields.parentPointId !== point.parentPointId)
      await requireFeedingPoint(acting, loopId, pointId, fields.parentPointId, transaction);
    const changes = changesOf<object>(point.get(), fields);
    point.set(fields);
    const flips = archived !== undefined && archived !== (point.archivedAt !== null);
    if (flips) {
      point.archivedAt = archived ? acting.clock.date() : null;
      changes.archived = { from: !archived, to: archived };
    }
    await namingFields(() => point.save({ transaction }), flips && !archived);
    if (pipe !== undefined)
      Object.assign(changes, await changePipe(acting, pointId, pipe, transaction));
    const counts = "pipe" in changes && (await holdsCounters(acting, pointId, transaction));
    if ("meterSide" in changes || "gapRule" in changes || counts)
      await recalculatePoint(acting, pointId, transaction);
    if (Object.keys(changes).length > 0)
      await recordPlaceEvent(
        acting,
        { kind: "point", id: pointId },
        "updated",
        changes,
        transaction,
      );
    return point;
  });
}

async function holdsCounters(
  { database }: Acting,
  pointId: string,
  transaction: Transaction,
): Promise<boolean> {
  const counters = ChannelBit.volumeCounter | ChannelBit.heatingCounter | ChannelBit.coolingCounter;
  const found = await database.query(
    `SELECT 1 FROM reading_block WHERE point_id = :pointId AND (channel_set & :counters) <> 0 LIMIT 1`,
    { replacements: { pointId, counters }, type: QueryTypes.SELECT, transaction },
  );
  return found.length > 0;
}

async function changePipe(
  acting: Acting,
  pointId: string,
  pipe: Pipe | null,
  transaction: Transaction,
) {
  const before = await keepBoreVersion(acting, pointId, pipe, transaction);
  return before === undefined ? {} : { pipe: { from: before, to: pipe } };
}
