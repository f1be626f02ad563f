import type { Acting } from "@server/commands/acting";
import { createBuilding } from "@server/commands/save-building";
import { createLoop } from "@server/commands/save-loop";
import { createPoint } from "@server/commands/save-point";
import { createSite } from "@server/commands/save-site";
import { Building } from "@server/models/building";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { Site } from "@server/models/site";
import { DEMO_BUILDINGS, DEMO_LOOPS, DEMO_SITE, type DemoLoop } from "./harbour-court-works";

export interface DemoPlaces {
  readonly site: Site;
  /** Metering point of each loop's tag. */
  readonly pointIds: ReadonlyMap<string, string>;
}

/**
 * Makes what is missing of the demo's site, buildings, loops and points. What a killed server had
 * made before is found by its name, tag or code and kept.
 */
export async function ensureDemoPlaces(acting: Acting): Promise<DemoPlaces> {
  const site =
    (await acting.scope.find(Site, { where: { isDemo: true }, order: [["id", "ASC"]] })) ??
    (await createSite(acting, DEMO_SITE, { isDemo: true }));
  const buildings = await ensureBuildings(acting, site.id);
  const loopIds = new Map<string, string>();
  const pointIds = new Map<string, string>();
  for (const demo of DEMO_LOOPS) {
    const { tag } = demo.loop;
    const loopId = await ensureLoop(acting, site.id, demo, buildings, loopIds);
    loopIds.set(tag, loopId);
    const { code } = demo.point;
    const point =
      (await acting.scope.find(MeteringPoint, { where: { loopId, code } })) ??
      (await createPoint(acting, loopId, demo.point));
    pointIds.set(tag, point.id);
  }
  return { site, pointIds };
}

async function ensureBuildings(acting: Acting, siteId: string): Promise<Map<string, string>> {
  const ids = new Map<string, string>();
  for (const building of DEMO_BUILDINGS) {
    const where = { siteId, name: building.name };
    const { id } =
      (await acting.scope.find(Building, { where })) ??
      (await createBuilding(acting, siteId, building));
    ids.set(building.name, id);
  }
  return ids;
}

async function ensureLoop(
  acting: Acting,
  siteId: string,
  { loop, parentTag, buildingName }: DemoLoop,
  buildings: ReadonlyMap<string, string>,
  loopIds: ReadonlyMap<string, string>,
): Promise<string> {
  const known = await acting.scope.find(Loop, { where: { siteId, tag: loop.tag } });
  if (known) return known.id;
  const made = await createLoop(acting, siteId, {
    ...loop,
    buildingId: buildings.get(buildingName) ?? null,
    parentLoopId: parentTag === null ? null : (loopIds.get(parentTag) ?? null),
  });
  return made.id;
}
