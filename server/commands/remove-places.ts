import type { Transaction } from "sequelize";
import { inTransaction } from "@server/database/transaction";
import { Conflict } from "@server/http/errors";
import { BoreVersion } from "@server/models/bore-version";
import { Building } from "@server/models/building";
import { ImportBatch } from "@server/models/import-batch";
import { Loop } from "@server/models/loop";
import { MeterComparison } from "@server/models/meter-comparison";
import { MeteringPoint } from "@server/models/metering-point";
import { Site } from "@server/models/site";
import { pointHoldings } from "@server/queries/point-holdings";
import { recordPlaceEvent, type Acting } from "./acting";

/** Readings are evidence: what they hang on is archived, never removed. */
async function requireEmpty(
  { database, scope }: Acting,
  of: "site" | "loop" | "point",
  id: string,
  name: string,
  transaction: Transaction,
): Promise<void> {
  const holdings = await pointHoldings(database, scope.organisationId, of, [id], transaction);
  if (holdings.length === 0) return;
  const what = holdings.some((point) => point.hasReadings) ? "readings" : "log files or evidence";
  throw new Conflict(
    "holds-readings",
    `${name} holds ${what}, so it cannot be removed.`,
    "Archive it instead: it leaves the lists, its readings stay, and it can be restored.",
  );
}

/** Saved comparisons and batches of files are evidence too, even where no reading is stored. */
async function requireNoRecords(
  { scope }: Acting,
  { id: siteId, name }: Site,
  transaction: Transaction,
): Promise<void> {
  const of = { where: { siteId }, transaction };
  if ((await scope.count(MeterComparison, of)) > 0)
    throw new Conflict(
      "holds-comparisons",
      `${name} holds comparisons of meters, so it cannot be removed.`,
      "Archive it instead: it leaves the lists, its comparisons stay, and it can be restored.",
    );
  if ((await scope.count(ImportBatch, of)) > 0)
    throw new Conflict(
      "holds-batches",
      `${name} holds files that were brought in together, so it cannot be removed.`,
      "Archive it instead: it leaves the lists, its files stay, and it can be restored.",
    );
}

async function removePoints(
  { scope }: Acting,
  pointIds: readonly string[],
  transaction: Transaction,
): Promise<void> {
  const { organisationId } = scope;
  if (pointIds.length === 0) return;
  const ids = [...pointIds];
  await BoreVersion.destroy({ where: { organisationId, pointId: ids }, transaction });
  // Children of each other: let go of parents first, so the order does not matter.
  await MeteringPoint.update(
    { parentPointId: null },
    { where: { organisationId, id: ids }, transaction },
  );
  await MeteringPoint.destroy({ where: { organisationId, id: ids }, transaction });
}

async function removeLoops(acting: Acting, loops: readonly Loop[], transaction: Transaction) {
  if (loops.length === 0) return;
  const { organisationId } = acting.scope;
  const ids = loops.map((loop) => loop.id);
  const points = await acting.scope.list(MeteringPoint, {
    where: { loopId: ids },
    attributes: ["id"],
    transaction,
  });
  await removePoints(
    acting,
    points.map((point) => point.id),
    transaction,
  );
  await Loop.update({ parentLoopId: null }, { where: { organisationId, id: ids }, transaction });
  await Loop.destroy({ where: { organisationId, id: ids }, transaction });
}

export async function removeSite(acting: Acting, siteId: string): Promise<void> {
  await inTransaction(acting.database, async (transaction) => {
    const lock = transaction.LOCK.UPDATE;
    const site = await acting.scope.get(Site, siteId, "site", { transaction, lock });
    await requireEmpty(acting, "site", siteId, site.name, transaction);
    await requireNoRecords(acting, site, transaction);
    const loops = await acting.scope.list(Loop, { where: { siteId }, transaction });
    await removeLoops(acting, loops, transaction);
    const { organisationId } = acting.scope;
    await Building.destroy({ where: { organisationId, siteId }, transaction });
    await site.destroy({ transaction });
    const details = { name: site.name, loops: loops.map((loop) => loop.tag) };
    await recordPlaceEvent(acting, { kind: "site", id: siteId }, "removed", details, transaction);
  });
}

export async function removeBuilding(acting: Acting, buildingId: string): Promise<void> {
  await inTransaction(acting.database, async (transaction) => {
    const lock = transaction.LOCK.UPDATE;
    const building = await acting.scope.get(Building, buildingId, "building", {
      transaction,
      lock,
    });
    const loops = await acting.scope.list(Loop, { where: { buildingId }, transaction });
    if (loops.length > 0)
      throw new Conflict(
        "holds-loops",
        `${building.name} still holds ${loops.map((loop) => loop.tag).join(", ")}.`,
        "Move its loops to another building first, or archive the building instead.",
      );
    await building.destroy({ transaction });
    const details = { siteId: building.siteId, name: building.name };
    await recordPlaceEvent(
      acting,
      { kind: "building", id: buildingId },
      "removed",
      details,
      transaction,
    );
  });
}

export async function removeLoop(acting: Acting, loopId: string): Promise<void> {
  await inTransaction(acting.database, async (transaction) => {
    const lock = transaction.LOCK.UPDATE;
    const loop = await acting.scope.get(Loop, loopId, "loop", { transaction, lock });
    await requireEmpty(acting, "loop", loopId, loop.tag, transaction);
    const fed = await acting.scope.list(Loop, { where: { parentLoopId: loopId }, transaction });
    if (fed.length > 0)
      throw new Conflict(
        "feeds-loops",
        `${loop.tag} feeds ${fed.map((child) => child.tag).join(", ")}.`,
        "Give those another feeding loop first, or archive this one instead.",
      );
    await removeLoops(acting, [loop], transaction);
    const details = { siteId: loop.siteId, tag: loop.tag, name: loop.name };
    await recordPlaceEvent(acting, { kind: "loop", id: loopId }, "removed", details, transaction);
  });
}

export async function removePoint(acting: Acting, pointId: string): Promise<void> {
  await inTransaction(acting.database, async (transaction) => {
    const lock = transaction.LOCK.UPDATE;
    const point = await acting.scope.get(MeteringPoint, pointId, "point", { transaction, lock });
    await requireEmpty(acting, "point", pointId, point.code, transaction);
    const fed = await acting.scope.list(MeteringPoint, {
      where: { parentPointId: pointId },
      transaction,
    });
    if (fed.length > 0)
      throw new Conflict(
        "feeds-points",
        `${point.code} feeds ${fed.map((child) => child.code).join(", ")}.`,
        "Give those another parent point first, or archive this one instead.",
      );
    await removePoints(acting, [pointId], transaction);
    const details = { loopId: point.loopId, code: point.code, name: point.name };
    await recordPlaceEvent(acting, { kind: "point", id: pointId }, "removed", details, transaction);
  });
}
