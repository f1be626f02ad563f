import { DAY_MS, HOUR_MS, type Interval } from "./interval";
import { zoneOffsets } from "./zone-offsets";

/**
 * Days, ISO weeks, months and hours of a site's zone as stretches of UTC.
 *
 * A day runs from one local midnight to the next: 24 h, but 23 or 25 h when clocks change (24.5 h on
 * Lord Howe), so lengths are always taken from here. Dates are "YYYY-MM-DD".
 */
export interface LocalDay extends Interval {
  readonly date: string;
}

const DATE = /^(\d{4})-(\d{2})-(\d{2})$/;

/** Whether the text is a day of the calendar, written YYYY-MM-DD. */
export function isLocalDate(text: string): boolean {
  if (!DATE.test(text)) return false;
  const ms = Date.parse(`${text}T00:00:00Z`);
  return !Number.isNaN(ms) && dateOfLocalMs(ms) === text;
}

/** The date `days` after (or before) `date`. @throws RangeError when `date` is not a date. */
export function addDays(date: string, days: number): string {
  return dateOfLocalMs(localMsOfDate(date) + days * DAY_MS);
}

/** Monday is 1, Sunday 7. */
export function weekdayOf(date: string): number {
  return ((((localMsOfDate(date) / DAY_MS + 3) % 7) + 7) % 7) + 1;
}

/** The date on the wall at an instant. */
export function localDateOf(utcMs: number, zone: string): string {
  return dateOfLocalMs(zoneOffsets(zone).toLocal(utcMs));
}

/** First instant of a local date, UTC ms. Where midnight is skipped it is the moment of the change. */
export function startOfLocalDay(date: string, zone: string): number {
  const meaning = zoneOffsets(zone).fromLocal(localMsOfDate(date));
  if (meaning.kind === "unique") return meaning.utcMs;
  return meaning.kind === "repeated" ? meaning.earlierMs : meaning.changeMs;
}

export function localDay(date: string, zone: string): LocalDay {
  return {
    date,
    startMs: startOfLocalDay(date, zone),
    endMs: startOfLocalDay(addDays(date, 1), zone),
  };
}

/** From the start of `firstDate` to the start of `endDate`, which is not part of it. */
export function rangeOfDates(firstDate: string, endDate: string, zone: string): Interval {
  return { startMs: startOfLocalDay(firstDate, zone), endMs: startOfLocalDay(endDate, zone) };
}

/** Every local day that shares time with the interval, whole, in order. */
export function localDaysBetween(interval: Interval, zone: string): LocalDay[] {
  const days: LocalDay[] = [];
  if (!(interval.startMs < interval.endMs)) return days;
  let day = localDay(localDateOf(interval.startMs, zone), zone);
  while (day.startMs < interval.endMs) {
    // A date the zone skipped altogether (Apia, 30 December 2011) is no day.
    if (day.endMs > day.startMs) days.push(day);
    const date = addDays(day.date, 1);
    day = { date, startMs: day.endMs, endMs: startOfLocalDay(addDays(date, 1), zone) };
  }
  return days;
}

/** Every hour of the wall clock that shares time with the interval; a clock change ends one. */
export function localHoursBetween(interval: Interval, zone: string): Interval[] {
  const offsets = zoneOffsets(zone);
  const hours: Interval[] = [];
  if (!(interval.startMs < interval.endMs)) return hours;
  const first = offsets.segmentAt(interval.startMs);
  let startMs = interval.startMs - modulo(interval.startMs + first.offsetMs, HOUR_MS);
  if (startMs < first.startMs && offsets.offsetAt(first.startMs - 1) !== first.offsetMs) {
    startMs = first.startMs;
  }
  while (startMs < interval.endMs) {
    const { endMs: segmentEnd, offsetMs } = offsets.segmentAt(startMs);
    const hourEnd = startMs + HOUR_MS - modulo(startMs + offsetMs, HOUR_MS);
    const changes = segmentEnd < hourEnd && offsets.offsetAt(segmentEnd) !== offsetMs;
    const endMs = changes ? segmentEnd : hourEnd;
    hours.push({ startMs, endMs });
    startMs = endMs;
  }
  return hours;
}

export interface IsoWeek {
  /** The year the week counts in; differs from the calendar's round New Year. */
  readonly isoYear: number;
  /** 1 to 53. */
  readonly week: number;
}

/** ISO 8601 week: it starts on Monday and belongs to the year that holds its Thursday. */
export function isoWeekOf(date: string): IsoWeek {
  const thursday = addDays(date, 4 - weekdayOf(date));
  const isoYear = Number(thursday.slice(0, 4));
  const dayOfYear = (localMsOfDate(thursday) - Date.UTC(isoYear, 0, 1)) / DAY_MS;
  return { isoYear, week: Math.floor(dayOfYear / 7) + 1 };
}

/** Monday of an ISO week. */
export function mondayOf({ isoYear, week }: IsoWeek): string {
  const fourth = `${String(isoYear).padStart(4, "0")}-01-04`;
  return addDays(fourth, 1 - weekdayOf(fourth) + (week - 1) * 7);
}

export function weekRange(week: IsoWeek, zone: string): Interval {
  const monday = mondayOf(week);
  return rangeOfDates(monday, addDays(monday, 7), zone);
}

/** A calendar month, `month` 1 to 12. */
export function monthRange(year: number, month: number, zone: string): Interval {
  return rangeOfDates(
    dateOfLocalMs(Date.UTC(year, month - 1, 1)),
    dateOfLocalMs(Date.UTC(year, month, 1)),
    zone,
  );
}

function localMsOfDate(date: string): number {
  if (!isLocalDate(date)) throw new RangeError(`"${date}" is not a date written YYYY-MM-DD.`);
  return Date.parse(`${date}T00:00:00Z`);
}

function dateOfLocalMs(localMs: number): string {
  return new Date(localMs).toISOString().slice(0, 10);
}

function modulo(value: number, by: number): number {
  return ((value % by) + by) % by;
}
