import type { ClockReading, LoggerClock } from "@shared/domain/log-files/recipe";
import { isLocalDate } from "@shared/domain/time/local-calendar";
import { DAY_MS } from "@shared/domain/time/interval";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import { loggerOffsetMs } from "./logger-offset";

/** A note as somebody types it: a day at the site, and what two clocks showed at one moment. */
export interface NoteDraft {
  readonly day: string | null;
  /** As the logger showed it; its day is the nearest one. */
  readonly logger: string;
  /** As a right clock showed it at the site. */
  readonly right: string;
}

export const emptyNote: NoteDraft = { day: null, logger: "", right: "" };

/** Seconds since midnight of “9:31:48” or “9:31”; null where it is no time. */
export function secondOf(typed: string): number | null {
  const found = /^\s*(\d{1,2})[:.](\d{2})(?:[:.](\d{2}))?\s*$/.exec(typed);
  if (!found) return null;
  const [hour, minute, second] = [found[1], found[2], found[3] ?? "0"].map(Number);
  if (hour === undefined || minute === undefined || second === undefined) return null;
  return hour < 24 && minute < 60 && second < 60 ? hour * 3600 + minute * 60 + second : null;
}

export const isEmpty = ({ day, logger, right }: NoteDraft): boolean =>
  day === null && logger.trim() === "" && right.trim() === "";

/** The note as the recipe keeps it; null where the day or a time is none. */
export function noteOf(
  { day, logger, right }: NoteDraft,
  clock: LoggerClock,
  siteZone: string,
): ClockReading | null {
  const [loggerS, rightS] = [secondOf(logger), secondOf(right)];
  if (day === null || !isLocalDate(day) || loggerS === null || rightS === null) return null;
  const midnightMs = Date.parse(`${day}T00:00:00Z`);
  const meaning = zoneOffsets(siteZone).fromLocal(midnightMs + rightS * 1000);
  if (meaning.kind === "missing") return null;
  const rightMs = meaning.kind === "repeated" ? meaning.earlierMs : meaning.utcMs;
  const sameDayMs = midnightMs + loggerS * 1000 - loggerOffsetMs(clock, siteZone, rightMs);
  // A logger in another zone may be a day off on its own wall.
  const loggerMs = [sameDayMs - DAY_MS, sameDayMs, sameDayMs + DAY_MS].reduce((nearest, ms) =>
    Math.abs(ms - rightMs) < Math.abs(nearest - rightMs) ? ms : nearest,
  );
  return { loggerAt: new Date(loggerMs).toISOString(), rightAt: new Date(rightMs).toISOString() };
}

/** A kept note as it was typed. */
export function draftOfNote(
  { loggerAt, rightAt }: ClockReading,
  clock: LoggerClock,
  siteZone: string,
): NoteDraft {
  const rightMs = Date.parse(rightAt);
  const local = new Date(zoneOffsets(siteZone).toLocal(rightMs)).toISOString();
  const loggerMs = Date.parse(loggerAt) + loggerOffsetMs(clock, siteZone, rightMs);
  return {
    day: local.slice(0, 10),
    right: local.slice(11, 19),
    logger: new Date(loggerMs).toISOString().slice(11, 19),
  };
}

/** Seconds the logger is slow; negative where it is fast. */
export const slowS = ({ loggerAt, rightAt }: ClockReading): number =>
  (Date.parse(rightAt) - Date.parse(loggerAt)) / 1000;
