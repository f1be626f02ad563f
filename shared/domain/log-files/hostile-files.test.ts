import { Random } from "@test/generators/random";
import { createFileScan } from "./file-scan";
import { createLogReader } from "./log-reader";
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

  it("names other kinds of file and binary data as no text", () => {
    expect(recogniseLogFile(Uint8Array.of(0x50, 0x4b, 3, 4, 0, 0))).toMatchObject({
      code: "notText",
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
