import type { Scope } from "@server/database/scoped";
import type { Building } from "@server/models/building";
import { Loop } from "@server/models/loop";

/** Ids of those buildings in which a loop stands, in use or archived. */
export async function buildingsHoldingLoops(
  scope: Scope,
  buildings: readonly Building[],
): Promise<Set<string>> {
  if (buildings.length === 0) return new Set();
  const loops = await scope.list(Loop, {
    where: { buildingId: buildings.map((building) => building.id) },
    attributes: ["buildingId"],
    group: ["buildingId"],
  });
  return new Set(loops.flatMap(({ buildingId }) => (buildingId === null ? [] : [buildingId])));
}
