import { addDays, isLocalDate } from "@shared/domain/time/local-calendar";
import { daysInclusive, mondayOf } from "@features/ui";

/** Days shown: from `from`, up to but without `until`; YYYY-MM-DD in the site's zone. */
export interface ShownRange {
  readonly from: string;
  readonly until: string;
  /** Monday of the week where the range is one, else null. */
  readonly week: string | null;
}

export function weekOf(date: string): ShownRange {
  const monday = mondayOf(date);
  return { from: monday, until: addDays(monday, 7), week: monday };
}

/** First and last day, both shown. Seven days from a Monday are that week. */
export function daysOf(from: string, last: string): ShownRange {
  const until = addDays(last, 1);
  const week = mondayOf(from) === from && until === addDays(from, 7) ? from : null;
  return { from, until, week };
}

interface Asked {
  readonly week?: string | undefined;
  readonly from?: string | undefined;
  readonly to?: string | undefined;
}

/** What the address asks for, or null where it asks for nothing that is a date. */
export function askedRange({ week, from, to }: Asked): ShownRange | null {
  if (week !== undefined && isLocalDate(week)) return weekOf(week);
  if (from !== undefined && isLocalDate(from)) {
    if (to !== undefined && isLocalDate(to) && to >= from) return daysOf(from, to);
    if (to === undefined) return daysOf(from, from);
  }
  return null;
}

/** The range as the address says it; what is not said any more is removed. */
export function rangeParams(range: ShownRange): Record<"week" | "from" | "to", string | undefined> {
  return range.week !== null
    ? { week: range.week, from: undefined, to: undefined }
    : { week: undefined, from: range.from, to: addDays(range.until, -1) };
}

export function lastDayOf({ until }: ShownRange): string {
  return addDays(until, -1);
}

export function dayCount(range: ShownRange): number {
  return daysInclusive(range.from, lastDayOf(range));
}

/** The range of the same length before or after. */
export function neighbour(range: ShownRange, direction: -1 | 1): ShownRange {
  const by = direction * dayCount(range);
  return daysOf(addDays(range.from, by), addDays(lastDayOf(range), by));
}

/** A week with readings on fewer days is no picture of a week. */
const mostOfAWeek = 4;

/**
 * The week the page opens on: the last one with readings, or the one before where the last has only
 * begun; this one where none came yet.
 */
export function defaultRange(
  readings: { readonly first: string | null; readonly last: string | null },
  today: string,
): ShownRange {
  const { first, last } = readings;
  if (first === null || last === null || last > today) return weekOf(today);
  const week = weekOf(last);
  const before = neighbour(week, -1);
  return daysInclusive(week.from, last) < mostOfAWeek && first <= before.from ? before : week;
}
