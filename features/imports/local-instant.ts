import { zoneOffsets } from "@shared/domain/time/zone-offsets";

const HOUR_AND_MINUTE = /^([01]?\d|2[0-3])[:.]([0-5]\d)$/;

/**
 * The instant of a day and a typed time ("14:30") of a zone, UTC ms; null where it is no time or
 * never was on that day. Of an hour that comes twice it is the first.
 */
export function localInstant(isoDay: string, time: string, zone: string): number | null {
  const match = HOUR_AND_MINUTE.exec(time.trim());
  if (!match) return null;
  const wallMs =
    Date.parse(`${isoDay}T00:00:00Z`) + (Number(match[1]) * 60 + Number(match[2])) * 60_000;
  const meaning = zoneOffsets(zone).fromLocal(wallMs);
  if (meaning.kind === "missing") return null;
  return meaning.kind === "repeated" ? meaning.earlierMs : meaning.utcMs;
}
