import Papa from "papaparse";
import { readLogFixture } from "@test/fixtures/log-files/read-fixture";
import { Random } from "@test/generators/random";
import { writeLogFile, writeTwoFileLog } from "@test/generators/log-file";
import { createLogReader } from "./log-reader";
import { PlainRows } from "./plain-rows";
import type { RawRows } from "./raw-rows";
import type { FileRecipe } from "./recipe";
import { recogniseLogFile } from "./recognise-log-file";
import { RowTokeniser } from "./row-tokeniser";

function tokenise(
  bytes: Uint8Array,
  separator: "," | ";",
  quote: '"' | null,
  chunk: number,
): string[][] {
  const rows: string[][] = [];
  const tokeniser = new RowTokeniser({ separator, quote }, (row) => {
    rows.push(
      Array.from({ length: row.cellCount }, (_, i) =>
        new TextDecoder().decode(row.buffer.subarray(row.starts[i], row.ends[i])),
      ),
    );
  });
  for (let i = 0; i < bytes.length; i += chunk) tokeniser.push(bytes.subarray(i, i + chunk));
  tokeniser.end();
  return rows;
}

describe("splitting rows and cells", () => {
  it("agrees with papaparse on generated text, whatever the quotes, line ends and chunks", () => {
    const random = new Random(3);
    const pieces = [
      "6.35",
      "",
      "a b",
      'say ""x""',
      "1,5",
      "1;5",
      "line\nbreak",
      "m³/h",
      "  ",
      "-9999",
      "OL",
    ];
    for (let file = 0; file < 150; file++) {
      const quoted = random.chance(0.6);
      const separator = random.pick([",", ";"] as const);
      const cell = (): string => {
        const piece = random.pick(pieces);
        if (quoted && (random.chance(0.3) || /[",;\n]/.test(piece))) return `"${piece}"`;
        return piece.replace(/[",;\n]/g, "");
      };
      const lineEnd = random.pick(["\n", "\r\n"]);
      const rows = Array.from({ length: 30 }, () =>
        Array.from({ length: 4 }, cell).join(separator),
      );
      const text = rows.join(lineEnd) + lineEnd;
      const papa = Papa.parse<string[]>(text, {
        delimiter: separator,
        newline: lineEnd as "\n",
        skipEmptyLines: true,
      }).data;
      const bytes = new TextEncoder().encode(text);
      expect(tokenise(bytes, separator, quoted ? '"' : null, random.whole(1, 200))).toEqual(papa);
      expect(tokenise(bytes, separator, quoted ? '"' : null, 1 << 20)).toEqual(papa);
    }
  });

  it("loses no more than one row to a quote that is never closed", () => {
    const rows = ['1;"open;2', "3;4", "5;6"];
    expect(tokenise(new TextEncoder().encode(rows.join("\n")), ";", '"', 5)).toEqual([
      ["1", '"open', "2"],
      ["3", "4"],
      ["5", "6"],
    ]);
  });
});

function recipeOf(name: string): FileRecipe {
  const found = recogniseLogFile(readLogFixture(name));
  if ("code" in found) throw new Error(found.code);
  return found.recipe;
}

describe("reading a damaged file", () => {
  const reader = createLogReader(recipeOf("not-ok/damaged-rows.csv"));
  reader.push(readLogFixture("not-ok/damaged-rows.csv"));
  const raw = reader.end();

  it("lists every row and cell it could not read, with line, column, cell and remedy", () => {
    expect(raw.problems).toEqual([
      {
        code: "unreadableTime",
        line: 3,
        columnIndex: 0,
        column: "Time",
        cell: "2026-05-18 10:0x",
        remedy: "checkTimeFormat",
      },
      {
        code: "unreadableCell",
        line: 4,
        columnIndex: 1,
        column: "Flow m³/h",
        cell: "6,7 2",
        remedy: "checkDecimalMark",
      },
      {
        code: "shortRow",
        line: 5,
        columnIndex: null,
        column: null,
        cell: "2026-05-18 10:03",
        remedy: "correctInFile",
      },
      {
        code: "longRow",
        line: 6,
        columnIndex: null,
        column: null,
        cell: "2026-05-18 10:04",
        remedy: "checkSeparator",
      },
      {
        code: "longRow",
        line: 7,
        columnIndex: null,
        column: null,
        cell: "2026-05-18 10:05",
        remedy: "checkSeparator",
      },
      {
        code: "shortRow",
        line: 9,
        columnIndex: null,
        column: null,
        cell: "2026-05-18 10:07",
        remedy: "correctInFile",
      },
    ]);
    expect(raw.problemCount).toBe(6);
  });

  it("keeps the good cells of the rows it could read, and no reading is never zero", () => {
    expect([...raw.line]).toEqual([2, 4, 5, 8, 9]);
    expect([...(raw.channels[0]?.values ?? [])]).toEqual([6.7, NaN, 6.73, 6.76, 6.7]);
    expect([...(raw.channels[1]?.values ?? [])]).toEqual([6.3, 6.32, NaN, 6.36, NaN]);
  });
});

describe("reading a file in a national dialect", () => {
  it("takes thousands of any kind, its lines and its footer as they are", () => {
    for (const [name, flow] of [
      ["ok/windows-1252.csv", [1234.5, 1235.5, 999.5]],
      ["ok/narrow-no-break-thousands.csv", [1234.5, 12234.5]],
      ["ok/am-pm-split-quoted.csv", [1234.5, 1235.5, 1236.5]],
    ] as const) {
      const reader = createLogReader(recipeOf(name));
      reader.push(readLogFixture(name));
      const raw = reader.end();
      expect([...(raw.channels.find(({ meaning }) => meaning === "flow")?.values ?? [])]).toEqual(
        flow,
      );
      expect(raw.problemCount).toBe(0);
    }
    const reader = createLogReader(recipeOf("ok/month-names-footer.csv"));
    reader.push(readLogFixture("ok/month-names-footer.csv"));
    expect(reader.end().footer).toMatchObject({
      count: 1,
      examples: [{ line: 5, cell: "Ende der Aufzeichnung" }],
    });
  });
});

describe("the fast way for plain rows", () => {
  it("gives exactly what the careful way gives, whatever the file and the chunks", () => {
    let fast = 0;
    for (let seed = 1; seed <= 150; seed++) {
      const log = writeLogFile(seed);
      const found = recogniseLogFile(log.bytes);
      if ("code" in found || found.recipe.dialect.quote !== null) continue;
      const { time } = found.recipe;
      const format =
        time.format.kind === "calendar"
          ? { ...time.format, order: log.answers.order }
          : time.format;
      const plain: FileRecipe = { ...found.recipe, time: { ...time, format } };
      // A quote that never occurs sends every row the careful way.
      const careful: FileRecipe = { ...plain, dialect: { ...plain.dialect, quote: '"' } };
      if (PlainRows.suits(plain)) fast++;
      expect(PlainRows.suits(careful)).toBe(false);
      const read = (recipe: FileRecipe, chunk: number): RawRows => {
        const reader = createLogReader(recipe);
        for (let i = 0; i < log.bytes.length; i += chunk)
          reader.push(log.bytes.subarray(i, i + chunk));
        return reader.end();
      };
      expect(read(plain, 1 + ((seed * 6007) % 3000))).toEqual(read(careful, 1 << 20));
    }
    expect(fast).toBeGreaterThan(40);
  });

  it("needs no chunk after it was pushed: callers read the next into the same buffer", () => {
    const log = writeTwoFileLog({ seed: 9, days: 1 });
    const found = recogniseLogFile(log.flowFile.bytes);
    if ("code" in found) throw new Error(found.code);
    const { format } = found.recipe.time;
    const settled: FileRecipe = {
      ...found.recipe,
      time: {
        clock: null,
        format: format.kind === "calendar" ? { ...format, order: "dayMonthYear" } : format,
      },
    };
    for (const recipe of [
      settled,
      { ...settled, dialect: { ...settled.dialect, quote: '"' as const } },
    ]) {
      const whole = createLogReader(recipe);
      whole.push(log.flowFile.bytes);
      const reused = createLogReader(recipe);
      const chunk = Buffer.alloc(1000);
      for (let i = 0; i < log.flowFile.bytes.length; i += 1000) {
        const piece = log.flowFile.bytes.subarray(i, i + 1000);
        chunk.set(piece);
        reused.push(piece.length === 1000 ? chunk : chunk.subarray(0, piece.length));
      }
      expect(reused.end()).toEqual(whole.end());
    }
  });

  it("leaves rows that are not plain to the careful way, between rows that are", () => {
    const rows = [
      "2026-05-18 10:00;6,70",
      "2026-05-18 10:01; 6,71",
      "2026-05-18 10:02;-0,5",
      "2026-05-18 10:03;6;7",
      "x",
      "2026-05-18 24:00;1.234,5",
      "2026-05-19 00:01;OL",
      "2026-05-19 00:02;6,7",
      "2026-05-19 00:03",
      "2026-05-19 00:04;6,8",
    ];
    const text = `Time;Flow m³/h\r\n${rows.join("\r\n")}`;
    const found = recogniseLogFile(new TextEncoder().encode(text));
    if ("code" in found) throw new Error(found.code);
    const reader = createLogReader(found.recipe);
    for (const byte of new TextEncoder().encode(text)) reader.push(Uint8Array.of(byte));
    const whole = createLogReader(found.recipe);
    whole.push(new TextEncoder().encode(text));
    const raw = whole.end();
    expect(reader.end()).toEqual(raw);
    expect([...(raw.channels[0]?.values ?? [])]).toEqual([
      6.7,
      6.71,
      -0.5,
      1234.5,
      NaN,
      6.7,
      NaN,
      6.8,
    ]);
    expect([...raw.line]).toEqual([2, 3, 4, 7, 8, 9, 10, 11]);
    expect(raw.problems.map(({ code, line }) => [code, line])).toEqual([
      ["longRow", 5],
      ["unreadableTime", 6],
      ["shortRow", 10],
    ]);
  });
});
