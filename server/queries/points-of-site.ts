import type { Scope } from "@server/database/scoped";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { Site } from "@server/models/site";

/** Ids of a site's metering points, archived ones too: their logs stay findable. */
export async function pointsOfSite({ scope }: { scope: Scope }, siteId: string): Promise<string[]> {
  await scope.get(Site, siteId, "site");
  const loops = await scope.list(Loop, { attributes: ["id"], where: { siteId } });
  const loopId = loops.map(({ id }) => id);
  const points = await scope.list(MeteringPoint, { attributes: ["id"], where: { loopId } });
  return points.map(({ id }) => id);
}
