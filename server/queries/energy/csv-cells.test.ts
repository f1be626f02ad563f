import { csvFileName, csvRecord, numberCell, textCell, timeCells } from "./csv-cells";

describe("textCell", () => {
  it.each(["=1+1", "+1", "-1", "@SUM(A1)", "\tx"])("keeps %j from running as a formula", (text) => {
    expect(textCell(text)).toBe(`'${text}`);
  });

  it("quotes what RFC 4180 asks to quote, the apostrophe inside", () => {
    expect(textCell('=a,"b"')).toBe(`"'=a,""b"""`);
    expect(textCell("two\nlines")).toBe('"two\nlines"');
    expect(textCell("CHW-1B")).toBe("CHW-1B");
  });
});

it("leaves a negative number a number", () => {
  expect(numberCell(-12.5, 3)).toBe("-12.5");
  expect(numberCell(1e-9, 6)).toBe("0");
  expect(numberCell(null, 3)).toBe("");
});

// IANA tz database: London leaves summer time on 25 October 2026 at 01:00 UTC.
it("writes the repeated hour with the offset of each pass", () => {
  const times = timeCells("Europe/London");
  expect(times(Date.UTC(2026, 9, 25, 0, 30))).toEqual([
    "2026-10-25T00:30:00Z",
    "2026-10-25T01:30:00+01:00",
  ]);
  expect(times(Date.UTC(2026, 9, 25, 1, 30))).toEqual([
    "2026-10-25T01:30:00Z",
    "2026-10-25T01:30:00+00:00",
  ]);
  expect(timeCells("America/St_Johns")(Date.UTC(2026, 0, 1))[1]).toBe("2025-12-31T20:30:00-03:30");
});

it("ends a record as RFC 4180 does and names files without characters a system refuses", () => {
  expect(csvRecord(["a", "b"])).toBe("a,b\r\n");
  expect(csvFileName(["CHW/1:B", "=x", "days"])).toBe("CHW-1-B_x_days.csv");
});
