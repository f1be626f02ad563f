import type { Language } from "./language";
import { localeOf } from "./numbers";

export type DateStyle =
  | "weekdayDay"
  | "weekdayDayYear"
  | "dayMonth"
  | "dayMonthYear"
  | "full"
  | "monthYear"
  | "weekdayShort";

const fields: Readonly<Record<DateStyle, Intl.DateTimeFormatOptions>> = {
  weekdayDay: { weekday: "short", day: "numeric", month: "short" },
  weekdayDayYear: { weekday: "short", day: "numeric", month: "short", year: "numeric" },
  dayMonthYear: { day: "numeric", month: "short", year: "numeric" },
  dayMonth: { day: "numeric", month: "short" },
  full: { weekday: "long", day: "numeric", month: "long", year: "numeric" },
  monthYear: { month: "long", year: "numeric" },
  weekdayShort: { weekday: "short" },
};

const cache = new Map<string, Intl.DateTimeFormat>();

function formatter(
  language: Language,
  zone: string,
  options: Intl.DateTimeFormatOptions,
): Intl.DateTimeFormat {
  const key = `${language}|${zone}|${JSON.stringify(options)}`;
  const found = cache.get(key);
  if (found) return found;
  const made = new Intl.DateTimeFormat(localeOf(language), { ...options, timeZone: zone });
  cache.set(key, made);
  return made;
}

/** “Thu 14 May”, “Do. 14. Mai”: the parts in reading order, without the comma some locales add. */
export function formatDate(
  ms: number,
  zone: string,
  language: Language,
  style: DateStyle = "weekdayDay",
): string {
  const parts = formatter(language, zone, fields[style]).formatToParts(ms);
  return parts
    .map((part) => (part.type === "literal" ? part.value.replace(",", "") : part.value))
    .join("")
    .replace(/\s+/g, " ")
    .trim();
}

/**
 * Whether a day must be written with its year: it lies in another than today's at the site.
 * @param isoDay, today YYYY-MM-DD; without a today nothing is known to be of this year, and none is
 *   written.
 */
export function needsYear(isoDay: string, today: string | null): boolean {
  return today !== null && isoDay.slice(0, 4) !== today.slice(0, 4);
}

/** Local time of day, “15:30”, seconds only where asked. */
export function formatTime(ms: number, zone: string, language: Language, seconds = false): string {
  const options: Intl.DateTimeFormatOptions = {
    hour: "2-digit",
    minute: "2-digit",
    hourCycle: "h23",
    ...(seconds ? { second: "2-digit" } : {}),
  };
  return formatter(language, zone, options).format(ms);
}

/** Noon UTC of a calendar day: a stand-in instant to format a day that has no time. */
export function dayInstant(isoDay: string): number {
  return Date.parse(`${isoDay}T12:00:00Z`);
}
