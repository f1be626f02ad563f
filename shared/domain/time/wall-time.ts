import { isLocalDate } from "./local-calendar";
import { zoneOffsets } from "./zone-offsets";

/** A day and a time of day as they are on a wall at the site. */
export interface WallTime {
  /** YYYY-MM-DD; null while nothing is picked. */
  readonly day: string | null;
  /** As typed: 7:30, 07:30. */
  readonly time: string;
}

/** Minutes since midnight of a typed time of day; null where it is none. */
export function minuteOf(typed: string): number | null {
  const found = /^\s*(\d{1,2})[:.](\d{2})\s*$/.exec(typed);
  const [hour, minute] = [Number(found?.[1] ?? NaN), Number(found?.[2] ?? NaN)];
  return hour < 24 && minute < 60 ? hour * 60 + minute : null;
}

/**
 * The instant of a wall time, ISO in UTC; null while day or time is none. In the hour that comes
 * twice in autumn it is the first one; in the one that is skipped in spring, the moment of change.
 */
export function instantOf({ day, time }: WallTime, zone: string): string | null {
  const minute = minuteOf(time);
  if (day === null || minute === null || !isLocalDate(day)) return null;
  const meaning = zoneOffsets(zone).fromLocal(Date.parse(`${day}T00:00:00Z`) + minute * 60_000);
  const ms =
    meaning.kind === "unique"
      ? meaning.utcMs
      : meaning.kind === "repeated"
        ? meaning.earlierMs
        : meaning.changeMs;
  return new Date(ms).toISOString();
}

/** An instant as the wall shows it, to the minute it falls in. */
export function wallTimeOf(instant: string, zone: string): WallTime {
  const local = new Date(zoneOffsets(zone).toLocal(Date.parse(instant))).toISOString();
  return { day: local.slice(0, 10), time: local.slice(11, 16) };
}
