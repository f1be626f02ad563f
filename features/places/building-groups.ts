import type { Building } from "@shared/contracts/places";
import type { BuildingGroup } from "./building-card";
import type { OverviewLoop } from "./overview-loop-row";

/**
 * Loops under the building they stand in. Buildings whose loops feed others come last, because
 * risers rise from them; loops of no building stand together under `loose`.
 */
export function groupByBuilding(
  buildings: readonly Building[],
  loops: readonly OverviewLoop[],
  words: { readonly loose: string; readonly mains: string },
): BuildingGroup[] {
  const feeding = new Set(loops.map(({ loop }) => loop.parentLoopId));
  const known = new Set(buildings.map((building) => building.id));
  const isRoot = ({ loop }: OverviewLoop) => loop.parentLoopId === null && feeding.has(loop.id);
  const groups = buildings.map((building) => {
    const inside = loops.filter(({ loop }) => loop.buildingId === building.id);
    const isSource = inside.some(isRoot);
    return {
      key: building.id,
      name: building.name,
      note: building.note ?? (isSource ? words.mains : null),
      isSource,
      loops: inside,
    };
  });
  const loose = loops.filter(({ loop }) => loop.buildingId === null || !known.has(loop.buildingId));
  if (loose.length > 0)
    groups.push({
      key: "loose",
      name: words.loose,
      note: null,
      isSource: loose.some(isRoot),
      loops: loose,
    });
  return groups
    .filter((group) => group.loops.length > 0)
    .sort((a, b) => Number(a.isSource) - Number(b.isSource));
}
