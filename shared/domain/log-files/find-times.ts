import type { KindRow } from "./find-dialect";
import { roughNumber, type CellKind } from "./cell-kind";
import { headerMeaning } from "./header-words";

/** Where the timestamps stand and in which family of formats. */
export type TimeColumns =
  | { readonly kind: "calendar"; readonly index: number }
  | { readonly kind: "split"; readonly dateIndex: number; readonly timeIndex: number }
  | {
      readonly kind: "epochSeconds" | "epochMilliseconds" | "spreadsheetDays";
      readonly index: number;
    };

/** Share of rows in which a column must look like a time: some rows are damaged. */
const MIN_SHARE = 0.6;

/** 1990 to 2100, in each unit. */
const NUMERIC_RANGES = [
  { kind: "epochSeconds", min: 631_152_000, max: 4_102_444_800 },
  { kind: "epochMilliseconds", min: 631_152_000_000, max: 4_102_444_800_000 },
  { kind: "spreadsheetDays", min: 32_874, max: 73_051 },
] as const;

/** The time columns of rows of data, or null if no column holds times. */
export function findTimeColumns(
  rows: readonly KindRow[],
  columnCount: number,
  headers: readonly string[],
): TimeColumns | null {
  const share = (index: number, kind: CellKind): number =>
    rows.filter((row) => row.kinds[index] === kind).length / Math.max(1, rows.length);
  const columns = Array.from({ length: Math.min(columnCount, 200) }, (_, i) => i);
  const withTime = columns.filter((i) => share(i, "dateTime") >= MIN_SHARE);
  const withTimeOnly = columns.filter((i) => share(i, "timeOfDay") >= MIN_SHARE);
  // Midnights are sometimes written without their time.
  const withDate = columns.filter((i) => share(i, "date") + share(i, "dateTime") >= MIN_SHARE);
  const [first] = withTime;
  if (first !== undefined && share(first, "dateTime") >= share(first, "date"))
    return { kind: "calendar", index: first };
  const [date] = withDate;
  if (date !== undefined) {
    const time = withTimeOnly.find((i) => i > date) ?? withTimeOnly[0];
    return time === undefined
      ? { kind: "calendar", index: date }
      : { kind: "split", dateIndex: date, timeIndex: time };
  }
  return findNumericTimes(rows, columns, headers);
}

function findNumericTimes(
  rows: readonly KindRow[],
  columns: readonly number[],
  headers: readonly string[],
): TimeColumns | null {
  for (const { kind, min, max } of NUMERIC_RANGES) {
    for (const index of columns) {
      const values = rows
        .map((row) => roughNumber(row.cells[index] ?? ""))
        .filter((v) => v >= min && v <= max);
      if (values.length < rows.length * MIN_SHARE || values.length === 0) continue;
      const meaning = headerMeaning(headers[index] ?? "")?.meaning;
      const named = meaning === "time" || meaning === "date" || meaning === "timeOfDay";
      // A serial day is a number like many others: without a name it must be the first column and run upwards.
      if (
        named ||
        kind !== "spreadsheetDays" ||
        (index === 0 && meaning === undefined && mostlyRises(values))
      ) {
        return { kind, index };
      }
    }
  }
  return null;
}

function mostlyRises(values: readonly number[]): boolean {
  let rises = 0;
  for (let i = 1; i < values.length; i++)
    if ((values[i] as number) > (values[i - 1] as number)) rises++;
  return values.length > 2 && rises >= (values.length - 1) * 0.8;
}

/** Columns in which most rows of data have no word. */
export function wordlessColumns(rows: readonly KindRow[], columnCount: number): readonly number[] {
  return Array.from({ length: columnCount }, (_, index) => index).filter(
    (index) => rows.filter(({ kinds }) => kinds[index] === "text").length < rows.length / 2,
  );
}

/**
 * Whether a row has a time where the file's times stand. A number proves no time by itself: a serial
 * number above the header may look like a day, so its row must have no word where data has none.
 */
export function hasTime(
  row: KindRow,
  times: TimeColumns,
  wordless: readonly number[] = [],
): boolean {
  if (times.kind === "calendar") {
    const kind = row.kinds[times.index];
    return kind === "dateTime" || kind === "date";
  }
  if (times.kind === "split") {
    const date = row.kinds[times.dateIndex];
    return (date === "date" || date === "dateTime") && row.kinds[times.timeIndex] === "timeOfDay";
  }
  if (wordless.some((index) => row.kinds[index] === "text")) return false;
  const range = NUMERIC_RANGES.find(({ kind }) => kind === times.kind);
  const value = roughNumber(row.cells[times.index] ?? "");
  return range !== undefined && value >= range.min && value <= range.max;
}
