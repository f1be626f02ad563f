import type { Building as BuildingAnswer } from "@shared/contracts/places";
import { instantTextOrNull } from "@server/database/conversions";
import type { Building } from "@server/models/building";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";

/** `holdsLoops`: loops stand in it, in use or archived, so it can only be archived. */
export function presentBuilding(
  building: Building,
  facts: { readonly holdsLoops: boolean },
  actor: Actor,
): BuildingAnswer {
  const { editSites } = can(actor);
  return {
    id: building.id,
    siteId: building.siteId,
    name: building.name,
    note: building.note,
    archivedAt: instantTextOrNull(building.archivedAt),
    can: { edit: editSites, archive: editSites, remove: editSites && !facts.holdsLoops },
  };
}
