import { readLogFixture } from "@test/fixtures/log-files/read-fixture";
import { recogniseLogFile } from "./recognise-log-file";
import { recogniseHead, isUnreadable } from "./recognise-head";
import { createFileScan } from "./file-scan";
import { finishRecognition } from "./finish-recognition";
import type { Recognition } from "./recognition";

function recognised(name: string): Recognition {
  const found = recogniseLogFile(readLogFixture(name));
  if ("code" in found) throw new Error(`${name}: ${found.code}`);
  return found;
}

/** Encoding, separator, quote, header, units and first data line, columns and time in one line of text. */
function summary(name: string): string {
  const { dialect, columns, time } = recognised(name).recipe;
  const { encoding, separator, quote, headerLine, unitsLine, firstDataLine } = dialect;
  const cells = columns.map(({ meaning, unit, decimalMark }) =>
    [meaning, unit, decimalMark].filter((part) => part !== null).join(" "),
  );
  const format = time.format.kind === "calendar" ? String(time.format.order) : time.format.kind;
  return [
    encoding,
    separator,
    quote ?? "-",
    headerLine,
    unitsLine ?? "-",
    firstDataLine,
    ...cells,
    format,
  ].join(" | ");
}

describe("recognising a logger's file", () => {
  it.each([
    [
      "ok/am-pm-split-quoted.csv",
      `utf-8 | , | " | 1 | - | 2 | date . | timeOfDay . | flow L/s . | supply degF . | return degF . | skip . | monthDayYear`,
    ],
    [
      "ok/decimal-comma-semicolon-gpm-degf.csv",
      "utf-8 | ; | - | 5 | 6 | 7 | time , | flow US gpm , | supply degF , | return degF , | signal % , | dayMonthYear",
    ],
    [
      "ok/several-header-rows.csv",
      "utf-8 | , | - | 3 | 4 | 5 | time . | flow m3/h . | supply degC . | return degC . | yearMonthDay",
    ],
    [
      "ok/month-names-footer.csv",
      "utf-8 | | | - | 1 | - | 2 | time , | flow m3/h , | dayMonthYear",
    ],
    [
      "ok/utf-16le-tabs.txt",
      "utf-16le | \t | - | 1 | - | 2 | time , | supply degC , | return degC , | yearMonthDay",
    ],
    [
      "ok/utf-16be-without-mark.txt",
      "utf-16be | \t | - | 1 | - | 2 | time , | supply degC , | return degC , | yearMonthDay",
    ],
    [
      "ok/windows-1252.csv",
      "windows-1252 | ; | - | 1 | - | 2 | time , | flow m3/h , | supply degC , | return degC , | dayMonthYear",
    ],
    [
      "ok/serial-days.csv",
      "utf-8 | ; | - | 1 | - | 2 | time , | flow m3/h , | supply degC , | return degC , | spreadsheetDays",
    ],
    ["ok/epoch-seconds.csv", "utf-8 | , | - | 1 | - | 2 | time . | flow L/s . | epochSeconds"],
  ])("reads %s from its own bytes", (name, expected) => {
    expect(summary(name)).toBe(expected);
  });

  it("asks for nothing but the clock when the file proves the rest", () => {
    for (const name of [
      "ok/am-pm-split-quoted.csv",
      "ok/windows-1252.csv",
      "ok/serial-days.csv",
      "ok/several-header-rows.csv",
    ]) {
      expect(recognised(name).questions).toEqual([{ code: "loggerClock" }]);
    }
  });

  it("asks for no clock where cells carry an offset, the header says UTC, or a line above names it", () => {
    for (const name of [
      "ok/iso-with-offset.csv",
      "ok/utc-header.csv",
      "ok/epoch-seconds.csv",
      "ok/decimal-comma-semicolon-gpm-degf.csv",
    ]) {
      expect(recognised(name).questions).toEqual([]);
    }
    expect(recognised("ok/decimal-comma-semicolon-gpm-degf.csv").recipe.time.clock).toEqual({
      kind: "fixedOffset",
      offsetMinutes: 60,
    });
  });

  it("keeps what the lines above the header name", () => {
    expect(recognised("ok/decimal-comma-semicolon-gpm-degf.csv").preamble).toContainEqual({
      line: 2,
      label: "Seriennummer",
      value: "50417",
    });
  });

  it("takes interval means from a header that names the interval's start", () => {
    expect(recognised("ok/utc-header.csv").recipe.seriesKind).toBe("meanFromLabel");
  });
});

describe("the order of day and month", () => {
  it("is asked, with the step each choice would mean, when two orders fit every row (cell B01)", () => {
    const { recipe, questions } = recognised("not-ok/both-orders-fit.csv");
    expect(recipe.time.format).toEqual({ kind: "calendar", order: null });
    expect(questions).toContainEqual({
      code: "dateOrder",
      choices: ["dayMonthYear", "monthDayYear"],
      firstCell: "03/04/2025 08:00",
      lastCell: "05/04/2025 08:00",
      stepSeconds: [2 * 86_400, 61 * 86_400],
    });
  });

  it("is proved by a row anywhere in the file, which is named", () => {
    const { recipe, proofs } = recognised("not-ok/proof-in-last-row.csv");
    expect(recipe.time.format).toEqual({ kind: "calendar", order: "dayMonthYear" });
    expect(proofs).toContainEqual({
      about: "dateOrder",
      columnIndex: 0,
      line: 14,
      cell: "13/05/2026 08:00",
      certainty: "proved",
    });
  });

  it("is asked with three choices when the year has two digits and no date changes", () => {
    const choices = recognised("not-ok/two-digit-year.csv").questions.flatMap((question) =>
      question.code === "dateOrder" ? question.choices : [],
    );
    expect(choices).toEqual(["dayMonthYear", "monthDayYear", "yearMonthDay"]);
  });

  it("is asked when rows contradict each other", () => {
    expect(recognised("not-ok/contradicting-orders.csv").questions[0]).toMatchObject({
      code: "dateOrder",
      choices: ["dayMonthYear", "monthDayYear"],
    });
  });
});

describe("what nothing in the file proves", () => {
  it("asks for the flow unit with the range of the values, sentinels left out", () => {
    const { recipe, questions } = recognised("not-ok/flow-without-unit.csv");
    expect(questions[0]).toEqual({
      code: "flowUnit",
      columnIndex: 1,
      minValue: 6.7,
      maxValue: 6.72,
      choices: ["m3/h", "L/s", "L/min", "US gpm", "L/h"],
    });
    // T1 and T2 are taken in order, as a guess; 6 to 9 can only be °C.
    expect(recipe.columns.map(({ meaning }) => meaning)).toEqual([
      "time",
      "flow",
      "supply",
      "return",
      "signal",
      "skip",
    ]);
  });

  it("asks when 44 to 54 could be cold in °F or hot in °C", () => {
    expect(recognised("not-ok/temperature-fits-two-units.csv").questions).toContainEqual({
      code: "temperatureUnit",
      columnIndex: 2,
      minValue: 44.1,
      maxValue: 44.2,
    });
  });

  it("asks for the decimal mark where 12,345 may be twelve or twelve thousand, or a column shows both", () => {
    expect(recognised("not-ok/mark-unclear.csv").questions[0]).toEqual({
      code: "decimalMark",
      columnIndex: 1,
      cell: "12,345",
      line: 2,
    });
    expect(recognised("not-ok/mark-mixed-in-one-column.csv").questions[0]).toMatchObject({
      code: "decimalMark",
      columnIndex: 1,
    });
  });

  it("asks which of two flows is meant, and never takes imperial gallons for US gallons", () => {
    expect(recognised("not-ok/two-flows.csv").questions[0]).toEqual({
      code: "whichSet",
      sets: [
        { name: "1", columns: [{ index: 1, meaning: "flow", unit: "m3/h" }] },
        { name: "2", columns: [{ index: 2, meaning: "flow", unit: "m3/h" }] },
      ],
    });
    expect(recognised("not-ok/imperial-gallons.csv").questions[0]).toMatchObject({
      code: "flowUnit",
    });
  });
});

describe("a file that cannot be read", () => {
  it.each([
    ["not-ok/empty.csv", "empty", null],
    ["not-ok/no-times.csv", "noTimes", 2],
    ["not-ok/comma-cuts-decimals.csv", "columnsDoNotMatchHeader", 2],
    ["not-ok/hours-without-am-pm.csv", "halfDayUnknown", 6],
  ])("%s says %s", (name, code, line) => {
    expect(recogniseLogFile(readLogFixture(name))).toMatchObject({ code, line });
  });
});

describe("a pass over the file in small chunks", () => {
  it("finds the same as the whole at once", () => {
    for (const name of [
      "ok/windows-1252.csv",
      "ok/utf-16le-tabs.txt",
      "ok/am-pm-split-quoted.csv",
      "not-ok/proof-in-last-row.csv",
    ]) {
      const bytes = readLogFixture(name);
      const head = recogniseHead(bytes, true);
      if (isUnreadable(head)) throw new Error(head.code);
      const scan = createFileScan(head);
      for (let i = 0; i < bytes.length; i += 7) scan.push(bytes.subarray(i, i + 7));
      expect(finishRecognition(head, scan.end())).toEqual(recogniseLogFile(bytes));
    }
  });
});
