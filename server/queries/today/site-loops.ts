import { addDays, localDateOf, localDay } from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import { Building } from "@server/models/building";
import { Loop } from "@server/models/loop";
import type { MeteringPoint } from "@server/models/metering-point";
import type { Site } from "@server/models/site";
import { mainPoints } from "@server/queries/main-points";
import { loadDays, type DayEnergy } from "@server/readings/day-rows";
import { loadPointReadings, type PointReadings } from "@server/readings/point-readings";

/** A loop in use with the point that stands for it and what is known of that point's readings. */
export interface SiteLoop {
  readonly loop: Loop;
  readonly point: MeteringPoint | null;
  readonly readings: PointReadings | null;
  readonly buildingName: string | null;
  /** It feeds other loops and is fed by none here. */
  readonly isMain: boolean;
  /** Stored days of the week that ends with the site's day, ascending. */
  readonly week: readonly DayEnergy[];
}

export interface SiteLoops {
  /** The last local day that counts as whole for any loop; null where no loop has readings. */
  readonly day: string | null;
  readonly loops: readonly SiteLoop[];
}

const daysLooked = 7;

/** Loops of a site: mains first, then by tag. */
export async function siteLoops(
  { scope, database }: { scope: Scope; database: Database },
  site: Site,
): Promise<SiteLoops> {
  const [loops, buildings] = await Promise.all([
    scope.list(Loop, { where: { siteId: site.id, archivedAt: null }, order: [["tag", "ASC"]] }),
    scope.list(Building, { where: { siteId: site.id } }),
  ]);
  const points = await mainPoints(
    scope,
    loops.map((loop) => loop.id),
  );
  const readings = await loadPointReadings(
    database,
    scope.organisationId,
    [...points.values()].map((point) => point.id),
  );
  const day = lastWholeDay([...readings.values()], site.zone);
  const parents = new Set(loops.map((loop) => loop.parentLoopId));
  const buildingNames = new Map(buildings.map((building) => [building.id, building.name]));
  const found = await Promise.all(
    loops.map(async (loop): Promise<SiteLoop> => {
      const point = points.get(loop.id) ?? null;
      return {
        loop,
        point,
        readings: (point && readings.get(point.id)) ?? null,
        buildingName: (loop.buildingId && buildingNames.get(loop.buildingId)) ?? null,
        isMain: loop.parentLoopId === null && parents.has(loop.id),
        week:
          point && day
            ? await loadDays(database, point.id, addDays(day, 1 - daysLooked), addDays(day, 1))
            : [],
      };
    }),
  );
  found.sort((a, b) => Number(b.isMain) - Number(a.isMain));
  return { day, loops: found };
}

/**
 * The date of the last reading, or the one before it where that day's readings stop early: means
 * over half a day would be compared with whole ones.
 */
function lastWholeDay(readings: readonly PointReadings[], zone: string): string | null {
  const lasts = readings.flatMap(({ lastMs, nominalStepMs }) =>
    lastMs === null ? [] : [{ lastMs, stepMs: nominalStepMs ?? 0 }],
  );
  const last = lasts.reduce((a, b) => (b.lastMs > a.lastMs ? b : a), lasts[0] ?? none);
  if (last.lastMs === -Infinity) return null;
  const date = localDateOf(last.lastMs, zone);
  const stopsEarly = localDay(date, zone).endMs - last.lastMs > 2 * last.stepMs + 60_000;
  const before = addDays(date, -1);
  const reachesBack = readings.some(
    ({ firstMs }) => firstMs !== null && firstMs < localDay(date, zone).startMs,
  );
  return stopsEarly && reachesBack ? before : date;
}

const none = { lastMs: -Infinity, stepMs: 0 };
