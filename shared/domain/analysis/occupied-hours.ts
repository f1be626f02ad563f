import { MINUTE_MS } from "../time/interval";

/**
 * When people are in a building, by the clock of its site: the same hours on each of some weekdays.
 * A setting, not a measurement; {@link ASSUMED_OCCUPIED_HOURS} stands in until somebody sets it.
 */
export interface OccupiedHours {
  /** 1 Monday to 7 Sunday, ascending, each once. */
  readonly weekdays: readonly number[];
  /** Minutes since local midnight, `startMinute` < `endMinute` ≤ 1440. */
  readonly startMinute: number;
  readonly endMinute: number;
}

export const ASSUMED_OCCUPIED_HOURS: OccupiedHours = {
  weekdays: [1, 2, 3, 4, 5],
  startMinute: 7 * 60,
  endMinute: 19 * 60,
};

const DAY_MINUTES = 1440;
/** 1 January 1970 was a Thursday. */
const FIRST_WEEKDAY = 3;

/** Monday 1 to Sunday 7 of a wall-clock instant ("local milliseconds"). */
function weekdayOfLocal(localMs: number): number {
  const day = Math.floor(localMs / (DAY_MINUTES * MINUTE_MS));
  return ((((day + FIRST_WEEKDAY) % 7) + 7) % 7) + 1;
}

/** Whether the weekday is one with occupied hours. */
export function isWorkingDay(localMs: number, hours: OccupiedHours): boolean {
  return hours.weekdays.includes(weekdayOfLocal(localMs));
}

/**
 * Whether people are in at a wall-clock instant; the start belongs to it, the end does not.
 * Example: Monday to Friday 07:00 to 19:00: Monday 07:00 is occupied, 19:00 is not.
 */
export function isOccupied(localMs: number, hours: OccupiedHours): boolean {
  if (!isWorkingDay(localMs, hours)) return false;
  const minute = ((Math.floor(localMs / MINUTE_MS) % DAY_MINUTES) + DAY_MINUTES) % DAY_MINUTES;
  return minute >= hours.startMinute && minute < hours.endMinute;
}

/** "07:00" to "24:00" as minutes since midnight; the contract has checked the form. */
export function minuteOfClock(text: string): number {
  const [hour = "", minute = ""] = text.split(":");
  return Number(hour) * 60 + Number(minute);
}

/** Minutes since midnight as "07:00"; the end of the day is "24:00". */
export function clockOfMinute(minute: number): string {
  const two = (value: number) => String(value).padStart(2, "0");
  return `${two(Math.floor(minute / 60))}:${two(minute % 60)}`;
}
