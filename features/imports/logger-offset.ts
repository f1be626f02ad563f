import type { LoggerClock } from "@shared/domain/log-files/recipe";
import { standardOffsetMs } from "@shared/domain/time/standard-offset";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";

/** What a logger's clock shows ahead of UTC at an instant, ms. */
export function loggerOffsetMs(clock: LoggerClock, siteZone: string, utcMs: number): number {
  switch (clock.kind) {
    case "utc":
      return 0;
    case "fixedOffset":
      return clock.offsetMinutes * 60_000;
    case "siteStandard":
      return standardOffsetMs(siteZone, utcMs);
    case "site":
      return zoneOffsets(siteZone).offsetAt(utcMs);
    case "zone":
      return zoneOffsets(clock.zone).offsetAt(utcMs);
  }
}
