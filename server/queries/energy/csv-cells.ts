import { zoneOffsets } from "@shared/domain/time/zone-offsets";

const formulaStart = /^[=+\-@\t\r]/;
const needsQuotes = /[",\r\n]/;

/**
 * A text cell. One that a spreadsheet would run as a formula gets a leading apostrophe; quotes as
 * RFC 4180 asks. Only for text that people typed: numbers go through {@link numberCell}.
 */
export function textCell(text: string): string {
  const harmless = formulaStart.test(text) ? `'${text}` : text;
  return needsQuotes.test(harmless) ? `"${harmless.replace(/"/g, '""')}"` : harmless;
}

/** A number as it is, minus sign included, with at most so many decimals; empty where unknown. */
export function numberCell(value: number | null, decimals: number): string {
  return value === null || Number.isNaN(value) ? "" : String(Number(value.toFixed(decimals)));
}

/** Instants of a zone as text, twice: UTC, and the wall clock with its offset. */
export function timeCells(zone: string): (utcMs: number) => readonly [utc: string, local: string] {
  const offsets = zoneOffsets(zone);
  return (utcMs) => {
    const offsetMs = offsets.offsetAt(utcMs);
    const local = withoutZone(utcMs + offsetMs);
    return [`${withoutZone(utcMs)}Z`, `${local}${offsetText(offsetMs)}`];
  };
}

/** Milliseconds are written only where there are any. */
function withoutZone(ms: number): string {
  const text = new Date(ms).toISOString();
  return text.endsWith(".000Z") ? text.slice(0, 19) : text.slice(0, 23);
}

function offsetText(offsetMs: number): string {
  const minutes = Math.round(Math.abs(offsetMs) / 60_000);
  const part = (value: number) => String(value).padStart(2, "0");
  return `${offsetMs < 0 ? "-" : "+"}${part(Math.floor(minutes / 60))}:${part(minutes % 60)}`;
}

/** One record with the line end RFC 4180 asks for. */
export function csvRecord(cells: readonly string[]): string {
  return `${cells.join(",")}\r\n`;
}

/** A file name of letters, digits, dots and dashes that says what is inside. */
export function csvFileName(parts: readonly string[]): string {
  const safe = parts.map((part) => part.replace(/[^\p{L}\p{N}.]+/gu, "-").replace(/^-+|-+$/g, ""));
  return `${safe.filter((part) => part !== "").join("_")}.csv`;
}
