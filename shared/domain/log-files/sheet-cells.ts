/**
 * Cells of a spreadsheet as the text of a log.
 *
 * A date is a number of days with a date style (ECMA-376 part 1, 18.17.4 and 18.8.30): it is written as
 * an ISO 8601 local time without zone, everything else as the value it is, never as the style shows it.
 */

export type DateSystem = 1900 | 1904;

/** What a number format shows of a date. */
export type DateStyle = "date" | "time" | "dateTime";

const MS_PER_DAY = 86_400_000;
/** Day 0 of the 1900 system from 1 March 1900 on; before that its day 60 is a 29 February that never was. */
const EPOCH_1900_MS = Date.UTC(1899, 11, 30);
const EPOCH_1904_MS = Date.UTC(1904, 0, 1);
const LEAP_MISTAKE = 60;
/** 31 December 9999. */
const LAST_DAY_1900 = 2_958_466;

/** Built-in formats that show dates (18.8.30); 27–36 and 50–58 are dates in East Asian languages. */
export function builtInDateStyle(formatId: number): DateStyle | null {
  if (formatId >= 14 && formatId <= 17) return "date";
  if (formatId >= 18 && formatId <= 21) return "time";
  if (formatId === 22) return "dateTime";
  if ((formatId >= 27 && formatId <= 31) || formatId === 36) return "date";
  if (formatId >= 32 && formatId <= 35) return "time";
  if (formatId === 45 || formatId === 47) return "time";
  return formatId >= 50 && formatId <= 58 ? "date" : null;
}

/**
 * What a number format's code shows, or null where it shows a number. Text in quotes, after a
 * backslash and in brackets does not count; `[h]` counts hours past 24 and is a duration, no time.
 * Example: `dd/mm/yyyy\ hh:mm` is a date with time, `0.00" m³/h"` is none.
 */
export function dateStyleOf(code: string): DateStyle | null {
  // Of positive; negative; zero; text only the first says what a date looks like.
  const first = withoutLiterals(code).split(";")[0] ?? "";
  if (/\[(h+|m+|s+)\]/i.test(first)) return null;
  const bare = first.replace(/\[[^\]]*\]/g, "").replace(/am\/pm|a\/p/gi, "h");
  // Digits are of a number, but for the parts of a second.
  if (/general/i.test(bare) || /[0#?]/.test(bare.replace(/s[.,]0+/gi, "s"))) return null;
  const hasTime = /[hs]/i.test(bare);
  const hasDay = /[dy]/i.test(bare);
  // m alone is months, beside hours or seconds minutes.
  const hasMonth = /m/i.test(bare) && !hasTime;
  if (hasTime) return hasDay ? "dateTime" : "time";
  return hasDay || hasMonth ? "date" : null;
}

function withoutLiterals(code: string): string {
  return code.replace(/"[^"]*"?/g, "").replace(/[\\_*]./g, "");
}

/**
 * The local time a day number stands for, to the millisecond: `45853.5` is `2025-07-15T12:00:00` in the
 * 1900 system. A day without time is written `2025-07-15` where its style shows no time; a part of a
 * day `12:00:00` where its style shows no date. Null for numbers that are no date: negative ones, the
 * day 60 of the 1900 system, and what lies past the year 9999.
 */
export function dateText(days: number, style: DateStyle, system: DateSystem): string | null {
  if (!Number.isFinite(days) || days < 0) return null;
  if (style === "time" && days <= 1) return days === 1 ? "24:00:00" : timeText(days * MS_PER_DAY);
  const dayMs = dayOf(Math.floor(days), system);
  if (dayMs === null) return null;
  // A part that rounds up to a whole day belongs to the next.
  const instant = new Date(dayMs + Math.round((days - Math.floor(days)) * MS_PER_DAY));
  const [day = "", time = ""] = instant.toISOString().slice(0, -1).split("T");
  if (style === "date" && time === "00:00:00.000") return day;
  return `${day}T${time.endsWith(".000") ? time.slice(0, -4) : time}`;
}

function dayOf(day: number, system: DateSystem): number | null {
  if (system === 1904) return day >= LAST_DAY_1900 - 1462 ? null : EPOCH_1904_MS + day * MS_PER_DAY;
  if (day === LEAP_MISTAKE || day >= LAST_DAY_1900) return null;
  return EPOCH_1900_MS + (day < LEAP_MISTAKE ? day + 1 : day) * MS_PER_DAY;
}

function timeText(ms: number): string {
  const whole = Math.round(ms);
  if (whole >= MS_PER_DAY) return "24:00:00";
  const time = new Date(whole).toISOString().slice(11, -1);
  return time.endsWith(".000") ? time.slice(0, -4) : time;
}

/**
 * A stored number as text: with the digits it has, not those of the double beside it. Workbooks store
 * 6.7 as `6.7000000000000002`; both are the same double, and the shortest text of it is written.
 */
export function numberText(stored: string): string {
  const text = stored.trim();
  if (/^-?\d{1,15}$/.test(text) || /^-?\d{1,9}\.\d{1,6}$/.test(text)) return text;
  const value = Number(text);
  return text === "" || !Number.isFinite(value) ? text : String(value);
}

/** A text cell on one line: a line break within it would move the numbers of all rows below. */
export function oneLineText(text: string): string {
  return text
    .replace(/_x([0-9A-Fa-f]{4})_/g, (_, code: string) => String.fromCharCode(parseInt(code, 16)))
    .replace(/[\u0000-\u001f\u007f\u0085\u2028\u2029]+/g, " ")
    .trim();
}

/** A cell as it stands between tabs. */
export function quotedCell(text: string): string {
  return text.includes('"') ? `"${text.replace(/"/g, '""')}"` : text;
}

/** Column of a reference: `C7` is 2. Negative where there is none. */
export function columnOfReference(reference: string): number {
  let column = 0;
  let at = 0;
  for (; at < reference.length; at++) {
    const letter = reference.charCodeAt(at) - 64;
    if (letter < 1 || letter > 26) break;
    column = column * 26 + letter;
    if (column > MAX_SHEET_COLUMNS) return -1;
  }
  return column - 1;
}

/** ECMA-376 leaves both open; spreadsheets hold no more. */
export const MAX_SHEET_COLUMNS = 16_384;
export const MAX_SHEET_ROWS = 1_048_576;
