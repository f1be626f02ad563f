import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { Site } from "@server/models/site";
import { loadEnergySettings, type EnergySettings } from "@server/readings/energy-settings";
import { loadOnePointReadings, type PointReadings } from "@server/readings/point-readings";

/** A metering point with all that its figures depend on besides the readings themselves. */
export interface EnergyPoint {
  readonly point: MeteringPoint;
  readonly loop: Loop;
  readonly site: Site;
  readonly settings: EnergySettings;
  readonly readings: PointReadings;
}

/** @throws NotFound where the organisation has no such point. */
export async function loadEnergyPoint(
  { scope, database }: { scope: Scope; database: Database },
  pointId: string,
): Promise<EnergyPoint> {
  const point = await scope.get(MeteringPoint, pointId, "metering point");
  const [loop, settings, readings] = await Promise.all([
    scope.get(Loop, point.loopId, "loop"),
    loadEnergySettings(database, pointId),
    loadOnePointReadings(database, scope.organisationId, pointId),
  ]);
  const site = await scope.get(Site, loop.siteId, "site");
  return { point, loop, site, settings, readings };
}
