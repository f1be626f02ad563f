import { CalendarCell } from "./calendar-cell";
import type { DateOrder, TimeFormat } from "./recipe";
import { RowTokeniser } from "./row-tokeniser";
import { createTimeReader } from "./time-reader";

function read(text: string, format: TimeFormat, mark: "." | "," = "."): string | null {
  const column = { index: 0, header: "", meaning: "time", unit: null, decimalMark: mark } as const;
  const dialect = {
    encoding: "utf-8",
    separator: ";",
    quote: null,
    headerLine: null,
    unitsLine: null,
    firstDataLine: 1,
  } as const;
  const reader = createTimeReader({
    dialect,
    columns: [column],
    time: { format, clock: null },
    seriesKind: "instantaneous",
  });
  let found: string | null = null;
  const tokeniser = new RowTokeniser(dialect, (row) => {
    if (reader.read(row))
      found = new Date(reader.ms).toISOString().replace(reader.isUtc ? "~" : "Z", "");
  });
  tokeniser.push(new TextEncoder().encode(text));
  tokeniser.end();
  return found;
}

const calendar = (order: DateOrder): TimeFormat => ({ kind: "calendar", order });

describe("a timestamp", () => {
  it.each([
    // Cells B10, B15, B12 and B13 of the import checks.
    ["07/15/2025 12:05:00 AM", calendar("monthDayYear"), "2025-07-15T00:05:00.000"],
    ["15.07.2025 24:00:00", calendar("dayMonthYear"), "2025-07-16T00:00:00.000"],
    ["45853.5", { kind: "spreadsheetDays" }, "2025-07-15T12:00:00.000"],
    ["1752580800", { kind: "epochSeconds" }, "2025-07-15T12:00:00.000Z"],
    ["1752580800123", { kind: "epochMilliseconds" }, "2025-07-15T12:00:00.123Z"],
    ["45853.0006944444", { kind: "spreadsheetDays" }, "2025-07-15T00:01:00.000"],
    ["7/5/2025 12:05 PM", calendar("monthDayYear"), "2025-07-05T12:05:00.000"],
    ["7/5/2025 11:59\u202fp.m.", calendar("dayMonthYear"), "2025-05-07T23:59:00.000"],
    ["2025-07-15T12:00:00.25+02:00", calendar("yearMonthDay"), "2025-07-15T10:00:00.250Z"],
    ["2025-07-15 12:00-0530", calendar("yearMonthDay"), "2025-07-15T17:30:00.000Z"],
    ["2025-07-15T12:00:00Z", calendar("yearMonthDay"), "2025-07-15T12:00:00.000Z"],
    ["20250715T120000", calendar("yearMonthDay"), "2025-07-15T12:00:00.000"],
    ["15. Juli 2025 12:00", calendar("dayMonthYear"), "2025-07-15T12:00:00.000"],
    ["1. März 2026 00:01", calendar("dayMonthYear"), "2026-03-01T00:01:00.000"],
    ["Tue, Jul 15, 2025 12:00:01,5", calendar("monthDayYear"), "2025-07-15T12:00:01.500"],
    ["15-Jul-25 12:00", calendar("dayMonthYear"), "2025-07-15T12:00:00.000"],
    ["25-07-15 12.30", calendar("yearMonthDay"), "2025-07-15T12:30:00.000"],
    ["29/02/2024", calendar("dayMonthYear"), "2024-02-29T00:00:00.000"],
  ] as const)("%s is read", (text, format, expected) => {
    expect(read(text, format)).toBe(expected);
  });

  it.each([
    "29/02/2025 00:00",
    "13/13/2025 00:00",
    "12/05/2025 25:00",
    "12/05/2025 24:01",
    "12/05/2025 10:60",
    "12/05/2025 13:00 AM",
    "12/05/2025 10:0x",
    "12/05/2025 10:00 CEST",
    "12/05",
    "10:00",
    "",
    "12/05/2025T",
  ])("%p is no day-first timestamp", (text) => {
    expect(read(text, calendar("dayMonthYear"))).toBeNull();
  });

  it("leaves all orders open that a date exists in", () => {
    const cell = new CalendarCell();
    const mask = (text: string): number => {
      const bytes = new TextEncoder().encode(text);
      return cell.parse(bytes, 0, bytes.length) ? cell.orderMask() : -1;
    };
    expect([
      mask("03/04/2025"),
      mask("13/04/2025"),
      mask("04/13/2025"),
      mask("2025-04-13"),
      mask("11/10/12"),
      mask("31/31/2025"),
    ]).toEqual([3, 1, 2, 4, 7, 0]);
  });
});
