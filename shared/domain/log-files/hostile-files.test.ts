import { Random } from "@test/generators/random";
import { readLogFixture } from "@test/fixtures/log-files/read-fixture";
import { createFileScan } from "./file-scan";
import { findFixedWidth } from "./find-fixed-width";
import { createLogReader } from "./log-reader";
import { preambleFacts } from "./preamble-facts";
import type { FileRecipe } from "./recipe";
import { isUnreadable, recogniseHead } from "./recognise-head";
import { recogniseLogFile } from "./recognise-log-file";
import { resolveRows } from "./resolve-rows";
import { DEFAULT_REPAIR_CHOICES } from "./recipe";

const encode = (text: string): Uint8Array => new TextEncoder().encode(text);
const HEADER = "Time;Flow m³/h\n";
const ROW = "2026-05-18 10:00;6,70\n";

function plainRecipe(): FileRecipe {
  const found = recogniseLogFile(encode(HEADER + ROW + "2026-05-18 10:01;6,71\n"));
  if ("code" in found) throw new Error(found.code);
  return { ...found.recipe, time: { ...found.recipe.time, clock: { kind: "utc" } } };
}

/** Recognises and, where it can, reads and resolves; the outcome in a word. */
function survive(bytes: Uint8Array): string {
  const found = recogniseLogFile(bytes);
  if ("code" in found) return found.code;
  const { time } = found.recipe;
  const format =
    time.format.kind === "calendar"
      ? { ...time.format, order: time.format.order ?? "dayMonthYear" }
      : time.format;
  const recipe: FileRecipe = { ...found.recipe, time: { format, clock: { kind: "site" } } };
  const reader = createLogReader(recipe);
  reader.push(bytes);
  resolveRows(reader.end(), recipe, DEFAULT_REPAIR_CHOICES, "Europe/London");
  return "read";
}

describe("hostile bytes", () => {
  it("random bytes, and good files cut or damaged at random, end in a plain answer", () => {
    const random = new Random(2);
    const good = encode(HEADER + ROW.repeat(40));
    for (let i = 0; i < 200; i++) {
      const bytes =
        i % 2 === 0
          ? Uint8Array.from({ length: random.whole(0, 400) }, () => random.whole(0, 255))
          : good.slice(0, random.whole(0, good.length));
      if (i % 2 === 1)
        for (let k = 0; k < 8 && bytes.length > 0; k++)
          bytes[random.whole(0, bytes.length - 1)] = random.whole(0, 255);
      expect(survive(bytes)).toMatch(/^[a-zA-Z]+$/);
    }
  });

  it("columns of fixed width, cut, damaged or torn apart at random, end in a plain answer", () => {
    const random = new Random(11);
    const good = readLogFixture("ok/fixed-width-blank-cells.txt");
    const whole = recogniseLogFile(good);
    if ("code" in whole) throw new Error(whole.code);
    const recipe: FileRecipe = {
      ...whole.recipe,
      time: { ...whole.recipe.time, clock: { kind: "utc" } },
    };
    for (let i = 0; i < 150; i++) {
      const bytes = good.slice(0, random.whole(1, good.length));
      for (let k = 0; k < 6; k++) bytes[random.whole(0, bytes.length - 1)] = random.whole(0, 255);
      expect(survive(bytes)).toMatch(/^[a-zA-Z]+$/);
      // By a recipe made for the whole file, in pieces of any size: every row is read or reported.
      const reader = createLogReader(recipe);
      for (let at = 0; at < bytes.length; at += 13) reader.push(bytes.subarray(at, at + 13));
      const { rowCount, line } = reader.end();
      expect(line).toHaveLength(rowCount);
    }
  });

  it("lines of a million characters are no columns of fixed width, nor is a table of tabs", () => {
    const wide = `2026-05-18 10:00 ${"1 ".repeat(500_000)}\n`;
    expect(recogniseLogFile(encode(wide.repeat(3)))).toHaveProperty("code");
    expect(findFixedWidth(wide.repeat(5))).toBeNull();
    expect(findFixedWidth("10:00\t1\n".repeat(9))).toBeNull();
    expect(findFixedWidth("")).toBeNull();
  });

  it("labels and values without end give one fact at most, and soon", () => {
    const started = performance.now();
    const label = `${"serial ".repeat(20_000)}x`;
    const values = ["9".repeat(100_000), "1,".repeat(50_000), "- ".repeat(50_000), "("];
    for (const value of values)
      for (const name of ["Serial", "Bore (mm)", label, `Bore ${"(".repeat(50_000)}`])
        expect(preambleFacts([{ line: 1, label: name, value }]).length).toBeLessThan(2);
    expect(performance.now() - started).toBeLessThan(4000);
  });

  it("names other kinds of file and binary data as no text", () => {
    expect(recogniseLogFile(Uint8Array.of(0x50, 0x4b, 3, 4, 0, 0))).toMatchObject({
      code: "notText",
    });
    expect(recogniseLogFile(Uint8Array.of(0xd0, 0xcf, 0x11, 0xe0, 0, 0))).toMatchObject({
      code: "oldSpreadsheet",
    });
    expect(
      recogniseLogFile(Uint8Array.from({ length: 999 }, (_, i) => (i * 37) % 256)),
    ).toMatchObject({ code: "notText" });
  });

  it("reads UTF-16 that ends in half a character", () => {
    const text = "Time;Flow m³/h\r\n2026-05-18 10:00;6,70\r\n2026-05-18 10:01;6,71\r\n";
    const bytes = new Uint8Array(text.length * 2);
    for (let i = 0; i < text.length; i++) bytes[2 * i] = text.charCodeAt(i);
    expect(survive(bytes.subarray(0, bytes.length - 1))).toBe("read");
  });

  it("refuses a million columns and survives cells without end", () => {
    expect(recogniseLogFile(encode(`Time;${"1;".repeat(1_000_000)}\n`.repeat(2)))).toHaveProperty(
      "code",
    );
    expect(
      recogniseLogFile(encode(`2026-05-18 10:00${";1".repeat(300)}\n`.repeat(3))),
    ).toMatchObject({ code: "tooManyColumns" });
    for (const cell of [
      "9".repeat(300_000),
      `"${"x".repeat(300_000)}`,
      " ".repeat(300_000),
      "-".repeat(300_000),
    ]) {
      expect(
        survive(encode(`${HEADER}${ROW}2026-05-18 10:01;${cell}\n2026-05-18 10:02;6,72\n`)),
      ).toBe("read");
    }
  });

  it("reports a row of megabytes as one row and goes on, holding no more than that row", () => {
    const reader = createLogReader(plainRecipe());
    const filler = new Uint8Array(1 << 18).fill(120);
    reader.push(encode(HEADER + ROW));
    for (let i = 0; i < 64; i++) reader.push(filler);
    reader.push(encode("\n2026-05-18 10:02;6,72\n"));
    const raw = reader.end();
    expect(raw.rowCount).toBe(2);
    expect([...raw.line]).toEqual([2, 4]);
    expect(raw.problems).toMatchObject([{ code: "oversizeRow", line: 3 }]);
  });

  it("shows a formula as the text it is", () => {
    const reader = createLogReader(plainRecipe());
    reader.push(encode(`${HEADER}2026-05-18 10:00;=HYPERLINK(1)\n${ROW}`));
    expect(reader.end().problems).toMatchObject([
      { code: "unreadableCell", cell: "=HYPERLINK(1)", line: 2 },
    ]);
  });

  it("keeps the first thousand problems and counts them all", () => {
    const reader = createLogReader(plainRecipe());
    reader.push(encode(HEADER));
    for (let i = 0; i < 30; i++) reader.push(encode("2026-05-18 10:00;kaputt\n".repeat(100)));
    const raw = reader.end();
    expect([
      raw.problems.length,
      raw.problemCount,
      raw.unreadableCells.count,
      raw.rowCount,
    ]).toEqual([1000, 3000, 3000, 3000]);
  });

  it("takes time in proportion to the bytes, whatever they are", () => {
    const worst = ["1", "1,", "1 ", "-", '"', "\n", "1.1.1 ", "e", ":", "Jan "];
    for (const piece of worst) {
      const head = recogniseHead(encode(HEADER + ROW), false);
      if (isUnreadable(head)) throw new Error(head.code);
      const scan = createFileScan(head);
      const chunk = encode(piece.repeat(Math.ceil(200_000 / piece.length)));
      const started = performance.now();
      for (let i = 0; i < 10; i++) scan.push(chunk);
      scan.end();
      expect(performance.now() - started).toBeLessThan(8000);
    }
  });
});
