import type { z } from "zod";
import type {
  createBuilding as createContract,
  updateBuilding as updateContract,
} from "@shared/contracts/places";
import { inTransaction } from "@server/database/transaction";
import { Building } from "@server/models/building";
import { changesOf, recordPlaceEvent, type Acting } from "./acting";
import { namingFields } from "./place-names";
import { siteInUse } from "./site-in-use";

type NewBuilding = z.output<(typeof createContract)["body"]>;
type BuildingChanges = z.output<(typeof updateContract)["body"]>;

export async function createBuilding(
  acting: Acting,
  siteId: string,
  fields: NewBuilding,
): Promise<Building> {
  return inTransaction(acting.database, async (transaction) => {
    await siteInUse(acting, siteId, transaction);
    const building = await namingFields(() =>
      acting.scope.create(
        Building,
        {
          siteId,
          name: fields.name,
          note: fields.note || null,
          createdAt: acting.clock.date(),
        },
        { transaction },
      ),
    );
    await recordPlaceEvent(
      acting,
      { kind: "building", id: building.id },
      "created",
      { siteId, name: building.name },
      transaction,
    );
    return building;
  });
}

/** Changes, archives or restores a building. */
export async function updateBuilding(
  acting: Acting,
  buildingId: string,
  { archived, ...fields }: BuildingChanges,
): Promise<Building> {
  return inTransaction(acting.database, async (transaction) => {
    const building = await acting.scope.get(Building, buildingId, "building", {
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    const changes = changesOf(building.get(), fields);
    building.set(fields);
    const flips = archived !== undefined && archived !== (building.archivedAt !== null);
    if (flips) {
      building.archivedAt = archived ? acting.clock.date() : null;
      changes.archived = { from: !archived, to: archived };
    }
    await namingFields(() => building.save({ transaction }), flips && !archived);
    if (Object.keys(changes).length > 0)
      await recordPlaceEvent(
        acting,
        { kind: "building", id: buildingId },
        "updated",
        changes,
        transaction,
      );
    return building;
  });
}
