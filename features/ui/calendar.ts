import { addDays, isoWeekOf, localDateOf, weekdayOf } from "@shared/domain/time/local-calendar";

/** Calendar days as YYYY-MM-DD, with no zone: a day of the site is a day whatever the hour. */
const DAY_MS = 86_400_000;

export { addDays };

/** The calendar day it is at an instant in a zone. */
export const dayInZone = localDateOf;

/** Days from one to the other, both included: 11 to 17 May is 7. */
export function daysInclusive(from: string, to: string): number {
  return Math.round((Date.parse(to) - Date.parse(from)) / DAY_MS) + 1;
}

/** Monday of the week the day stands in (ISO 8601). */
export function mondayOf(isoDay: string): string {
  return addDays(isoDay, 1 - weekdayOf(isoDay));
}

/** ISO 8601 week number: the week with the year's first Thursday is week 1. */
export function isoWeek(isoDay: string): number {
  return isoWeekOf(isoDay).week;
}

/** Weeks (arrays of seven days from Monday) that touch the month of `isoDay`. */
export function weeksOfMonth(isoDay: string): string[][] {
  const month = isoDay.slice(0, 7);
  const weeks: string[][] = [];
  let monday = mondayOf(`${month}-01`);
  do {
    const first = monday;
    weeks.push(Array.from({ length: 7 }, (_, index) => addDays(first, index)));
    monday = addDays(monday, 7);
  } while (monday.slice(0, 7) === month);
  return weeks;
}

/** First day of the month `months` away. */
export function addMonths(isoDay: string, months: number): string {
  const year = Number(isoDay.slice(0, 4));
  const month = Number(isoDay.slice(5, 7)) - 1 + months;
  return new Date(Date.UTC(year, month, 1)).toISOString().slice(0, 10);
}
