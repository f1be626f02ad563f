import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import Papa from "papaparse";
import { DEFAULT_REPAIR_CHOICES } from "@shared/domain/log-files/recipe";
import { plainRecipe } from "@server/testing/import-factories";
import { writeProblemRows, type ProblemTask } from "./problem-rows-csv";

const folder = mkdtempSync(path.join(os.tmpdir(), "loopwright-problem-rows-"));
afterAll(() => rmSync(folder, { recursive: true }));

const minute = (i: number) => new Date(Date.UTC(2026, 1, 2) + i * 60_000).toISOString();

async function recordsOf(
  text: string | Buffer,
  more: Partial<ProblemTask> = {},
): Promise<string[][]> {
  const source = path.join(folder, "log.csv");
  const target = path.join(folder, "rows.csv");
  writeFileSync(source, text);
  await writeProblemRows({
    kind: "problems",
    files: [{ name: "log.csv", path: source, recipe: plainRecipe, expectedRows: 10 }],
    choices: DEFAULT_REPAIR_CHOICES,
    zone: "UTC",
    language: "en",
    most: 100,
    target,
    ...more,
  });
  const written = readFileSync(target, "utf8");
  expect(written.startsWith("\uFEFF")).toBe(true);
  return Papa.parse<string[]>(written.slice(1), { skipEmptyLines: true }).data;
}

it("puts each row as it is written beside what is wrong with it and what would help", async () => {
  const lines = ["time,flow,supply,return", `${minute(0)},1,6,12`, `${minute(1)},"1x",6,12`];
  const [head, ...rows] = await recordsOf(lines.join("\r\n"));
  expect(head).toEqual([
    "File",
    "Row",
    "Row as written",
    "Column",
    "Cell",
    "Code",
    "Reason",
    "What to do",
  ]);
  expect(rows).toEqual([
    [
      "log.csv",
      "3",
      `${minute(1)},"1x",6,12`,
      "flow",
      '"1x"',
      "unreadableCell",
      "This cell holds no number.",
      "Check the decimal mark of this column, or correct the cell.",
    ],
  ]);
});

it("speaks German where German is read", async () => {
  const text = `time,flow,supply,return\n${minute(0)},?,6,12`;
  const [head, row] = await recordsOf(text, { language: "de" });
  expect(head?.[1]).toBe("Zeile");
  expect(row?.[6]).toMatch(/^In dieser Zelle steht keine Zahl|^Der Logger hat ein Wort/);
});

it("runs nothing that a logger wrote as a formula", async () => {
  const text = `time,flow,supply,return\n=cmd|' /C calc'!A0,=1+1,6,12\n${minute(0)},1,6,12`;
  const cells = (await recordsOf(text)).flat();
  expect(cells.filter((cell) => /^[=+\-@]/.test(cell))).toEqual([]);
  expect(cells).toContain("'=cmd|' /C calc'!A0,=1+1,6,12");
});

it.each([
  ["line feeds", "\n"],
  ["carriage returns", "\r"],
  ["both", "\r\n"],
])(
  "finds the rows of a file that ends its lines with %s, past its first megabyte",
  async (_, end) => {
    const lines = ["time,flow,supply,return"];
    for (let i = 0; i < 40_000; i++)
      lines.push(`${minute(i)},${i % 20_000 === 9_999 ? "ab" : "1"},6,12`);
    const rows = (await recordsOf(lines.join(end))).slice(1);
    expect(rows.map(([, line, text]) => [line, text])).toEqual([
      ["10001", lines[10_000]],
      ["30001", lines[30_000]],
    ]);
  },
);

it("decodes what stands in the file's own encoding", async () => {
  const text = `time,flow,supply,return\n${minute(0)},größer,6,12\n`;
  const recipe = {
    ...plainRecipe,
    dialect: { ...plainRecipe.dialect, encoding: "windows-1252" as const },
  };
  const source = path.join(folder, "log.csv");
  const file = { name: "log.csv", path: source, recipe, expectedRows: 1 };
  const [, row] = await recordsOf(Buffer.from(text, "latin1"), { files: [file] });
  expect(row?.[2]).toBe(`${minute(0)},größer,6,12`);
});

it("says in a last record how many problems it does not list", async () => {
  const lines = ["time,flow,supply,return"];
  for (let i = 0; i < 250; i++) lines.push(`${minute(i)},ab,6,12`);
  const rows = (await recordsOf(lines.join("\n"), { most: 20 })).slice(1);
  expect(rows).toHaveLength(21);
  expect(rows[20]?.[5]).toBe("more");
  expect(rows[20]?.[6]).toBe("230 more problems are not listed here.");
});
