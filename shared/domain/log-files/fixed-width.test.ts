import { readLogFixture } from "@test/fixtures/log-files/read-fixture";
import { findFixedWidth } from "./find-fixed-width";
import { createFixedWidthStream } from "./fixed-width-stream";
import { createLogReader } from "./log-reader";
import type { FileRecipe } from "./recipe";
import { isUnreadable, recogniseHead, type GivenDialect } from "./recognise-head";
import { recogniseLogFile } from "./recognise-log-file";
import { createUtf8Stream } from "./text-encoding";

const encode = (text: string): Uint8Array => new TextEncoder().encode(text);

/** What the stream makes of text that comes in pieces of `size` bytes. */
function converted(text: string, starts: readonly number[], firstDataLine: number, size = 1000) {
  const stream = createFixedWidthStream(createUtf8Stream("utf-8"), starts, firstDataLine);
  const bytes = encode(text);
  let out = "";
  const decoder = new TextDecoder();
  for (let i = 0; i < bytes.length; i += size)
    out += decoder.decode(stream.convert(bytes.subarray(i, i + size)), { stream: true });
  return out + decoder.decode(stream.finish());
}

function recipeOf(name: string): FileRecipe {
  const found = recogniseLogFile(readLogFixture(name));
  if ("code" in found) throw new Error(found.code);
  return { ...found.recipe, time: { ...found.recipe.time, clock: { kind: "utc" } } };
}

describe("columns of fixed width", () => {
  it("are recognised where a cell is blank, and each value keeps its column", () => {
    const recipe = recipeOf("ok/fixed-width-blank-cells.txt");
    expect(recipe.dialect).toMatchObject({
      separator: "\t",
      quote: null,
      headerLine: 4,
      unitsLine: 5,
      firstDataLine: 6,
    });
    expect(recipe.columns.map(({ meaning, unit }) => [meaning, unit])).toEqual([
      ["date", null],
      ["timeOfDay", null],
      ["flow", "m3/h"],
      ["supply", "degC"],
      ["return", "degC"],
      ["status", null],
    ]);
    const reader = createLogReader(recipe);
    reader.push(readLogFixture("ok/fixed-width-blank-cells.txt"));
    const raw = reader.end();
    const column = (wanted: string) => [
      ...(raw.channels.find(({ meaning }) => meaning === wanted)?.values ?? []),
    ];
    expect(column("flow")).toEqual([9.98, 9.99, NaN, 10.01, 10.02, 123.45]);
    expect(column("supply")).toEqual([6.9, NaN, 6.91, 6.9, 6.92, 6.9]);
    expect(column("return")).toEqual([12.8, 12.81, 12.8, 12.79, NaN, 12.8]);
    expect(raw.problemCount).toBe(0);
  });

  it("begin where their headers do, though their numbers are flush right further on", () => {
    const rows = Array.from({ length: 8 }, (_, i) => {
      const flow = i === 3 ? "" : (35 + i / 10).toFixed(1);
      return `14.03.24 09:0${i}  ${flow.padStart(10)}  ${(157 + i / 10).toFixed(1).padStart(11)}  ${(140 + i / 10).toFixed(1).padStart(13)}`;
    });
    const header = "DATE     TIME      FLOW GPM  FLOW T DEGF  RETURN T DEGF";
    const found = recogniseLogFile(encode(["UNIT 5531", "", header, ...rows, ""].join("\r\n")));
    if ("code" in found) throw new Error(found.code);
    expect(found.recipe.columns.map((column) => [column.header, column.meaning])).toEqual([
      ["DATE", "date"],
      ["TIME", "timeOfDay"],
      ["FLOW GPM", "flow"],
      ["FLOW T DEGF", "supply"],
      ["RETURN T DEGF", "return"],
    ]);
    expect(found.recipe.columns.map(({ unit }) => unit)).toEqual([
      null,
      null,
      "US gpm",
      "degF",
      "degF",
    ]);
  });

  it("leave lines above the header whole, so that a serial number stays one", () => {
    const found = recogniseLogFile(readLogFixture("ok/fixed-width-blank-cells.txt"));
    if ("code" in found) throw new Error(found.code);
    expect(found.preamble).toContainEqual({ line: 2, label: "Serial number", value: "LG-50417" });
    expect(found.proofs.find(({ about }) => about === "separator")).toMatchObject({
      line: 6,
      certainty: "likely",
    });
  });

  it("are not taken where runs of spaces or a sign do as well", () => {
    const even = "2026-05-18 10:00  6.70  6.90\n2026-05-18 10:01  6.71  6.91\n".repeat(4);
    const head = recogniseHead(encode(even), true);
    if (isUnreadable(head)) throw new Error(head.code);
    expect(head.dialect).toMatchObject({ separator: " " });
    expect(head.dialect.columnStarts).toBeUndefined();
    const commas = recogniseLogFile(readLogFixture("ok/utc-header.csv"));
    if ("code" in commas) throw new Error(commas.code);
    expect(commas.recipe.dialect.columnStarts).toBeUndefined();
  });

  it("can be asked for, found anew or at given places, and given up again", () => {
    const even = encode("2026-05-18 10:00  6.70  6.90\n2026-05-18 10:01  6.71  6.91\n".repeat(4));
    const starts = (given: GivenDialect) => {
      const head = recogniseHead(even, true, given);
      if (isUnreadable(head)) throw new Error(head.code);
      return [head.dialect.separator, head.dialect.columnStarts, head.columnCount];
    };
    expect(starts({ separator: "\t", columnStarts: [] })).toEqual(["\t", [0, 11, 18, 24], 4]);
    expect(starts({ separator: "\t", columnStarts: [0, 17] })).toEqual(["\t", [0, 17], 2]);
    expect(starts({ separator: " " })).toEqual([" ", undefined, 4]);
  });

  it("give a value that grows to the left the room of the gap", () => {
    const lines = Array.from({ length: 6 }, (_, i) => `10:0${i}     9.9${i}`);
    expect(findFixedWidth(lines.join("\n"))?.columnStarts).toEqual([0, 10]);
    const growing = lines.map((line, i) => (i === 3 ? line.replace("  9.", "12.") : line));
    // A width that varies is seen in the head: the boundary moves to the left.
    expect(findFixedWidth(growing.join("\n"))?.columnStarts).toEqual([0, 6]);
  });

  it("keep AM and PM with their time, and words of one column together", () => {
    const head = "Date       Time        Flow  Supply Remark\n";
    const rows = [
      "07/15/2026 12:05:00 AM  6.70  6.90   ok",
      "07/15/2026 12:06:00 AM        6.90   signal too low",
      "07/15/2026  1:07:00 PM  6.70         ok",
      "07/15/2026  1:08:00 PM  6.70  6.90   ok",
    ];
    const found = recogniseLogFile(encode(head + rows.join("\n")));
    if ("code" in found) throw new Error(found.code);
    expect(found.recipe.dialect.columnStarts).toEqual([0, 11, 23, 29, 37]);
    expect(found.sampleRows[1]?.cells).toEqual([
      "07/15/2026",
      "12:06:00 AM",
      "",
      "6.90",
      "signal too low",
    ]);
    // A header that begins behind the blank has a column of its own.
    const two = findFixedWidth(
      `Time  A  B  T\n${["ab cd", "ef gh", "ij kl", "mn op"].map((w, i) => `10:0${i} ${w} 6.7`).join("\n")}`,
    );
    expect(two?.columnStarts).toEqual([0, 6, 9, 12]);
  });

  it("never cut a value in two: a row that crosses a boundary is reported, not read", () => {
    const recipe = recipeOf("ok/fixed-width-blank-cells.txt");
    const reader = createLogReader(recipe);
    const text = new TextDecoder().decode(readLogFixture("ok/fixed-width-blank-cells.txt"));
    reader.push(encode(text.replace("10.02    6.92", "10.0277776.92")));
    const raw = reader.end();
    expect(raw.problems).toMatchObject([{ code: "longRow", line: 10, remedy: "checkSeparator" }]);
    expect(raw.rowCount).toBe(5);
  });
});

describe("the stream", () => {
  it("counts characters, not bytes, and keeps line ends and blank lines", () => {
    const text = "Zeit  T °C\r\n\r\n10:00 6,90\r10:01 °°°°\n";
    expect(converted(text, [0, 6], 3)).toBe("Zeit\tT °C\r\n\r\n10:00\t6,90\r10:01\t°°°°\n");
  });

  it("gives the same in pieces of any size", () => {
    const text = "Date  Größe\r\n\r\n10:00  6,9 \r\n10:01     \r\n10:02 abcdef";
    const whole = converted(text, [0, 6], 3);
    expect(whole).toBe("Date\tGröße\r\n\r\n10:00\t6,9\r\n10:01\t\r\n10:02\tabcdef");
    for (const size of [1, 2, 3, 7]) expect(converted(text, [0, 6], 3, size)).toBe(whole);
  });

  it("gives a word above the readings to the column that holds more of it, and marks one below", () => {
    const text = "Temperature x\n10:00 123456 78\n";
    expect(converted(text, [0, 8], 2)).toBe("Temperature\tx\n10:00 12\t3456 78\t?\n");
  });

  it("passes a line without end on as it is, with memory that stays flat", () => {
    const stream = createFixedWidthStream(createUtf8Stream("utf-8"), [0, 4], 1);
    const piece = new Uint8Array(1 << 20).fill(120);
    let bytes = 0;
    for (let i = 0; i < 32; i++) bytes += stream.convert(piece).length;
    bytes += stream.convert(encode("\nab  cd\n")).length + stream.finish().length;
    expect(bytes).toBe((32 << 20) + 7);
  });
});
