import type { DecimalMark } from "@shared/domain/log-files/recipe";

/** How a generated file spells its numbers. */
export interface NumberStyle {
  readonly mark: DecimalMark;
  /** Between thousands; "" for none. */
  readonly group: string;
}

/** A number held as a whole count of its last decimal, so that text and value agree exactly. */
export function numberText(scaled: number, decimals: number, style: NumberStyle): string {
  const digits = String(Math.abs(scaled)).padStart(decimals + 1, "0");
  let whole = digits.slice(0, digits.length - decimals);
  const fraction = digits.slice(digits.length - decimals);
  if (style.group !== "") {
    const groups: string[] = [];
    while (whole.length > 3) {
      groups.unshift(whole.slice(-3));
      whole = whole.slice(0, -3);
    }
    whole = [whole, ...groups].join(style.group);
  }
  return `${scaled < 0 ? "-" : ""}${whole}${decimals === 0 ? "" : style.mark + fraction}`;
}

/** The value {@link numberText} writes. */
export function numberValue(scaled: number, decimals: number): number {
  const digits = String(Math.abs(scaled)).padStart(decimals + 1, "0");
  const point = digits.length - decimals;
  return Number(`${scaled < 0 ? "-" : ""}${digits.slice(0, point)}.${digits.slice(point)}`);
}

export type DateStyle =
  | "dmy"
  | "mdy"
  | "ymd"
  | "dmyShort"
  | "mdyShort"
  | "ymdShort"
  | "dmyLoose"
  | "mdyLoose"
  | "monthEnglish"
  | "monthGerman"
  | "monthFirst"
  | "compact";
export type ClockStyle = "minutes" | "seconds" | "fraction" | "halfDay";

/** Midnight as some loggers write it: hour 24 of the day before. */
export function writtenMidnight(localMs: number): {
  readonly dateMs: number;
  readonly is24: boolean;
} {
  const is24 = localMs % 86_400_000 === 0;
  return { dateMs: is24 ? localMs - 86_400_000 : localMs, is24 };
}

const ENGLISH = [
  "Jan",
  "Feb",
  "Mar",
  "Apr",
  "May",
  "Jun",
  "Jul",
  "Aug",
  "Sep",
  "Oct",
  "Nov",
  "Dec",
];
const GERMAN = [
  "Januar",
  "Februar",
  "März",
  "April",
  "Mai",
  "Juni",
  "Juli",
  "August",
  "September",
  "Oktober",
  "November",
  "Dezember",
];

const two = (n: number): string => String(n).padStart(2, "0");

/** @param localMs the wall clock's fields as if they were UTC */
export function dateText(localMs: number, style: DateStyle, separator: string): string {
  const date = new Date(localMs);
  const y = date.getUTCFullYear();
  const m = date.getUTCMonth() + 1;
  const d = date.getUTCDate();
  const short = two(y % 100);
  switch (style) {
    case "dmy":
      return [two(d), two(m), y].join(separator);
    case "mdy":
      return [two(m), two(d), y].join(separator);
    case "ymd":
      return [y, two(m), two(d)].join(separator);
    case "dmyShort":
      return [two(d), two(m), short].join(separator);
    case "mdyShort":
      return [two(m), two(d), short].join(separator);
    case "ymdShort":
      return [short, two(m), two(d)].join(separator);
    case "dmyLoose":
      return [d, m, y].join(separator);
    case "mdyLoose":
      return [m, d, y].join(separator);
    case "monthEnglish":
      return `${two(d)}-${ENGLISH[m - 1]}-${y}`;
    case "monthGerman":
      return `${d}. ${GERMAN[m - 1]} ${y}`;
    case "monthFirst":
      return `${ENGLISH[m - 1]} ${d} ${y}`;
    case "compact":
      return `${y}${two(m)}${two(d)}`;
  }
}

export function clockText(localMs: number, style: ClockStyle, mark: string): string {
  const date = new Date(localMs);
  const h = date.getUTCHours();
  const minutes = two(date.getUTCMinutes());
  const seconds = two(date.getUTCSeconds());
  switch (style) {
    case "minutes":
      return `${two(h)}:${minutes}`;
    case "seconds":
      return `${two(h)}:${minutes}:${seconds}`;
    case "fraction":
      return `${two(h)}:${minutes}:${seconds}${mark}${String(date.getUTCMilliseconds()).padStart(3, "0")}`;
    case "halfDay":
      return `${h % 12 === 0 ? 12 : h % 12}:${minutes}:${seconds} ${h < 12 ? "AM" : "PM"}`;
  }
}

export type ByteStyle =
  | "utf-8"
  | "utf-8 with mark"
  | "utf-16le"
  | "utf-16le with mark"
  | "utf-16be"
  | "utf-16be with mark"
  | "windows-1252";

const CP1252: Readonly<Record<string, number>> = { "€": 0x80, "’": 0x92, "–": 0x96 };

/** @throws Error for a character the encoding does not have: the generator must not ask for it */
export function encodeText(text: string, style: ByteStyle): Uint8Array {
  if (style === "utf-8") return new TextEncoder().encode(text);
  if (style === "utf-8 with mark") return new TextEncoder().encode(`\ufeff${text}`);
  if (style === "windows-1252") {
    return Uint8Array.from(text, (c) => {
      const code = CP1252[c] ?? c.charCodeAt(0);
      if (code > 255) throw new Error(`Windows-1252 has no ${c}`);
      return code;
    });
  }
  const marked = style.endsWith("mark") ? `\ufeff${text}` : text;
  const bytes = new Uint8Array(marked.length * 2);
  const view = new DataView(bytes.buffer);
  for (let i = 0; i < marked.length; i++)
    view.setUint16(i * 2, marked.charCodeAt(i), style.startsWith("utf-16le"));
  return bytes;
}
