import { CalendarCell } from "./calendar-cell";
import { plainNumberText } from "./number-cell";
import { isSentinelToken } from "./sentinels";

/** What a piece of text in a cell could be, before anything is known about its column. */
export type CellKind = "dateTime" | "date" | "timeOfDay" | "number" | "token" | "empty" | "text";

const calendar = new CalendarCell();
const encoder = new TextEncoder();

export function cellKind(text: string): CellKind {
  if (text === "") return "empty";
  const bytes = encoder.encode(text);
  if (calendar.parse(bytes, 0, bytes.length)) {
    if (!calendar.hasDate) return "timeOfDay";
    if (calendar.orderMask() !== 0) return calendar.hasTime ? "dateTime" : "date";
  }
  if (plainNumberText(text, ".") !== null || plainNumberText(text, ",") !== null) return "number";
  return isSentinelToken(text) ? "token" : "text";
}

export function isDateLike(kind: CellKind): boolean {
  return kind === "dateTime" || kind === "date" || kind === "timeOfDay";
}

/** The number a cell holds in either convention, NaN if none; only for telling epochs and serial days. */
export function roughNumber(text: string): number {
  const plain = plainNumberText(text, ".") ?? plainNumberText(text, ",");
  return plain === null ? NaN : Number(plain);
}
