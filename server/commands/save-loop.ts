import type { Transaction } from "sequelize";
import type { z } from "zod";
import type {
  createLoop as createContract,
  updateLoop as updateContract,
} from "@shared/contracts/places";
import { inTransaction } from "@server/database/transaction";
import { Invalid, type FieldError } from "@server/http/errors";
import { Building } from "@server/models/building";
import { fluidColumns, Loop } from "@server/models/loop";
import { Site } from "@server/models/site";
import { changesOf, recordPlaceEvent, type Acting } from "./acting";
import { requireParent } from "./parent-rules";
import { namingFields } from "./place-names";
import { recalculateLoop } from "./recalculate-points";
import { siteInUse } from "./site-in-use";

type NewLoop = z.output<(typeof createContract)["body"]>;
type LoopChanges = z.output<(typeof updateContract)["body"]>;
type LoopFields = Omit<LoopChanges, "archived">;

/** What the energy of a loop's readings hangs on. */
const energyColumns = [
  // They bound what a counter can have counted.
  "designFlowM3PerHour",
  "designDeltaTK",
  "service",
  "fluidKind",
  "glycolPercent",
  "glycolBasis",
  "gaugePressureMPa",
  "flowCutOffM3PerHour",
  "deltaTCutOffK",
] as const;

async function requirePlaces(
  { scope }: Acting,
  siteId: string,
  loop: Loop | null,
  { buildingId, parentLoopId }: LoopFields,
  transaction: Transaction,
): Promise<void> {
  if (buildingId && buildingId !== loop?.buildingId) {
    const where = { id: buildingId, siteId, archivedAt: null };
    if ((await scope.find(Building, { where, transaction })) === null)
      throw Invalid.field(
        "buildingId",
        "no-such-building",
        "This site has no such building in use.",
      );
  }
  if (parentLoopId && parentLoopId !== loop?.parentLoopId) {
    const loops = await scope.list(Loop, {
      where: { siteId },
      attributes: ["id", "parentLoopId", "archivedAt"],
      transaction,
    });
    const siblings = loops.map(({ id, parentLoopId: parentId, archivedAt }) => ({
      id,
      parentId,
      inUse: archivedAt === null,
    }));
    const rule = { field: "parentLoopId", thing: "loop", whole: "site" } as const;
    requireParent(siblings, loop?.id ?? null, parentLoopId, rule);
  }
}

/** A cut-off at or above the design value would keep every reading out of the energy. */
function requireCutOffsBelowDesign(loop: Loop): void {
  const errors: FieldError[] = [];
  const { flowCutOffM3PerHour, designFlowM3PerHour, deltaTCutOffK, designDeltaTK } = loop;
  if (
    flowCutOffM3PerHour !== null &&
    designFlowM3PerHour !== null &&
    flowCutOffM3PerHour >= designFlowM3PerHour
  )
    errors.push({
      pointer: "/body/flowCutOffM3PerHour",
      code: "not-below-design",
      message: `Must be below the design flow of ${designFlowM3PerHour} m³/h.`,
    });
  if (deltaTCutOffK !== null && designDeltaTK !== null && deltaTCutOffK >= designDeltaTK)
    errors.push({
      pointer: "/body/deltaTCutOffK",
      code: "not-below-design",
      message: `Must be below the design ΔT of ${designDeltaTK} K.`,
    });
  if (errors.length > 0) throw new Invalid(errors);
}

export async function createLoop(acting: Acting, siteId: string, body: NewLoop): Promise<Loop> {
  return inTransaction(acting.database, async (transaction) => {
    await siteInUse(acting, siteId, transaction);
    await requirePlaces(acting, siteId, null, body, transaction);
    const { fluid, ...fields } = body;
    const loop = Loop.build({
      siteId,
      organisationId: acting.scope.organisationId,
      buildingId: null,
      parentLoopId: null,
      gaugePressureMPa: null,
      designFlowM3PerHour: null,
      designDeltaTK: null,
      flowCutOffM3PerHour: null,
      deltaTCutOffK: null,
      ...fields,
      ...fluidColumns(fluid ?? { kind: "water" }),
      notes: fields.notes || null,
      archivedAt: null,
      createdAt: acting.clock.date(),
    });
    requireCutOffsBelowDesign(loop);
    await namingFields(() => loop.save({ transaction }));
    await recordPlaceEvent(
      acting,
      { kind: "loop", id: loop.id },
      "created",
      { siteId, tag: loop.tag },
      transaction,
    );
    return loop;
  });
}

/**
 * Changes, archives or restores a loop. Energy already stored is recalculated, in the background,
 * when something it hangs on changed.
 */
export async function updateLoop(
  acting: Acting,
  loopId: string,
  { archived, fluid, ...fields }: LoopChanges,
): Promise<Loop> {
  return inTransaction(acting.database, async (transaction) => {
    const lock = transaction.LOCK.UPDATE;
    const { siteId } = await acting.scope.get(Loop, loopId, "loop", { transaction });
    await acting.scope.get(Site, siteId, "site", { transaction, lock });
    const loop = await acting.scope.get(Loop, loopId, "loop", { transaction, lock });
    await requirePlaces(acting, siteId, loop, fields, transaction);
    const columns = { ...fields, ...(fluid ? fluidColumns(fluid) : {}) };
    const changes = changesOf<object>(loop.get(), columns);
    loop.set(columns);
    requireCutOffsBelowDesign(loop);
    const flips = archived !== undefined && archived !== (loop.archivedAt !== null);
    if (flips) {
      loop.archivedAt = archived ? acting.clock.date() : null;
      changes.archived = { from: !archived, to: archived };
    }
    await namingFields(() => loop.save({ transaction }), flips && !archived);
    if (energyColumns.some((column) => column in changes))
      await recalculateLoop(acting, loopId, transaction);
    if (Object.keys(changes).length > 0)
      await recordPlaceEvent(acting, { kind: "loop", id: loopId }, "updated", changes, transaction);
    return loop;
  });
}
