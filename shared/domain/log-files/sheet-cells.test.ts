import {
  builtInDateStyle,
  columnOfReference,
  dateStyleOf,
  dateText,
  numberText,
  oneLineText,
} from "./sheet-cells";

describe("a spreadsheet's day number", () => {
  it.each([
    [45853.5, "dateTime", 1900, "2025-07-15T12:00:00"],
    [45853, "date", 1900, "2025-07-15"],
    [45853, "dateTime", 1900, "2025-07-15T00:00:00"],
    // A style may hide the time: it is written all the same.
    [45853.25, "date", 1900, "2025-07-15T06:00:00"],
    [0.5, "time", 1900, "12:00:00"],
    [1, "time", 1900, "24:00:00"],
    [45853.5, "time", 1900, "2025-07-15T12:00:00"],
    // ECMA-376 part 1, 18.17.4.1: 1 January 1900 is day 1, 1 March 1900 day 61.
    [1, "date", 1900, "1900-01-01"],
    [59, "date", 1900, "1900-02-28"],
    [61, "date", 1900, "1900-03-01"],
    // 18.17.4.1: the 1904 system begins with day 0 on 1 January 1904.
    [0, "date", 1904, "1904-01-01"],
    [44391.5, "dateTime", 1904, "2025-07-15T12:00:00"],
  ] as const)("%s as %s from %s is %s", (days, style, system, expected) => {
    expect(dateText(days, style, system)).toBe(expected);
  });

  it("is a number, not a date, where no such day ever was", () => {
    expect(dateText(60, "date", 1900)).toBeNull();
    expect(dateText(-1, "date", 1900)).toBeNull();
    expect(dateText(3e6, "dateTime", 1900)).toBeNull();
  });

  it("keeps every second of a year of minutes, whose parts of a day are no exact doubles", () => {
    for (let minute = 0; minute < 525_600; minute += 37) {
      const expected = new Date(Date.UTC(2025, 0, 1) + minute * 60_000).toISOString().slice(0, 19);
      expect(dateText(45658 + minute / 1440, "dateTime", 1900)).toBe(expected);
    }
  });
});

test("a number format tells dates from numbers", () => {
  expect(
    ["dd/mm/yyyy\\ hh:mm", "yyyy-mm-dd", "h:mm AM/PM", "mmm-yy", "mm:ss.0"].map(dateStyleOf),
  ).toEqual(["dateTime", "date", "time", "date", "time"]);
  expect(
    ["0.00", "General", '0.0" days"', "#,##0", "[Red]0.0", "[h]:mm", "0.00\\ h", "@"].map(
      dateStyleOf,
    ),
  ).toEqual([null, null, null, null, null, null, null, null]);
  expect([14, 20, 22, 2, 46].map(builtInDateStyle)).toEqual([
    "date",
    "time",
    "dateTime",
    null,
    null,
  ]);
});

test("a number is written with the digits it has", () => {
  expect(numberText("6.7000000000000002")).toBe("6.7");
  expect(numberText("28.80")).toBe("28.80");
  expect(numberText("0.1234567890123456")).toBe("0.1234567890123456");
  expect(Number(numberText("1.7976931348623157E308"))).toBe(1.7976931348623157e308);
  expect(numberText("-9999")).toBe("-9999");
});

test("a text cell stays on one line, and references name columns", () => {
  expect(oneLineText("Flow\n(m³/h)_x000D_")).toBe("Flow (m³/h)");
  expect(["A1", "Z3", "AA10", "XFD1", "XFE1", "1"].map(columnOfReference)).toEqual([
    0, 25, 26, 16383, -1, -1,
  ]);
});
