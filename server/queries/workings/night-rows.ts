import { sumIntervals } from "@shared/domain/energy/totals";
import { HOUR_MS, type Interval } from "@shared/domain/time/interval";
import { localDaysBetween } from "@shared/domain/time/local-calendar";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import type { Database } from "@server/database/connect";
import type { EnergyRow } from "@server/queries/energy/energy-rows";
import { nightHours } from "@server/queries/energy/loads";
import { loadIntervalsOf } from "@server/readings/interval-rows";

/** The nights of a range by the wall clock: longer or shorter where clocks change in them. */
export function nightsOf(range: Interval, zone: string): Interval[] {
  const offsets = zoneOffsets(zone);
  return localDaysBetween(range, zone).flatMap((day) => {
    const at = (hour: number) => {
      const utcMs = day.startMs + hour * HOUR_MS;
      return utcMs + offsets.offsetAt(day.startMs) - offsets.offsetAt(utcMs);
    };
    const startMs = Math.max(range.startMs, at(nightHours.fromHour));
    const endMs = Math.min(range.endMs, at(nightHours.toHour));
    return startMs < endMs ? [{ startMs, endMs }] : [];
  });
}

/** One row a night: all that its base and the base's ± are worked out from. */
export async function nightRows(
  database: Database,
  pointId: string,
  range: Interval,
  zone: string,
): Promise<EnergyRow[]> {
  const nights = nightsOf(range, zone);
  const columns = await loadIntervalsOf(database, pointId, nights);
  return sumIntervals(columns, nights).map(({ startMs, endMs, ...totals }) => ({
    startMs,
    endMs,
    totals,
  }));
}
