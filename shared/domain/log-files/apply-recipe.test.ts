import { applyRecipe, type FileEvidence } from "./apply-recipe";
import type { ColumnRecipe, FileRecipe } from "./recipe";
import { isUnreadable } from "./recognise-head";
import { recogniseLogFile } from "./recognise-log-file";

function evidenceOf(lines: readonly string[], more: Partial<FileEvidence> = {}): FileEvidence {
  const found = recogniseLogFile(new TextEncoder().encode(lines.join("\n")));
  if (isUnreadable(found)) throw new Error(`not readable: ${found.code}`);
  const { recipe, proofs, questions, sampleRows } = found;
  return {
    proposed: recipe,
    proofs,
    asked: questions,
    sampleRows,
    service: "cooling",
    insideDiameterMm: 100,
    ...more,
  };
}

const rows = (write: (minute: number) => string) =>
  Array.from({ length: 30 }, (_, minute) => write(minute));
const two = (value: number) => String(value).padStart(2, "0");

/** A file that leaves flow unit, temperatures' unit, date order and clock to be asked. */
const plain = ["Time,Flow,Supply,Return"].concat(
  rows((minute) => `03/04/2026 08:${two(minute)},12.${minute % 10},44.5,54.25`),
);

function answered(file: FileEvidence, change: Partial<FileRecipe> = {}): FileRecipe {
  const units: Partial<Record<string, ColumnRecipe["unit"]>> = {
    flow: "L/s",
    supply: "degF",
    return: "degF",
  };
  return {
    ...file.proposed,
    columns: file.proposed.columns.map((column) => ({
      ...column,
      unit: units[column.meaning] ?? column.unit,
    })),
    time: { format: { kind: "calendar", order: "dayMonthYear" }, clock: { kind: "utc" } },
    ...change,
  };
}

const saved = answered(evidenceOf(plain));
const codes = ({ differences }: ReturnType<typeof applyRecipe>) =>
  differences.map(({ code }) => code);

it("answers everything for another file of the same logger and setting", () => {
  const next = evidenceOf(
    ["Time,Flow,Supply,Return"].concat(
      rows((minute) => `05/06/2026 09:${two(minute)},9.${minute % 10},45,55`),
    ),
  );
  const applied = applyRecipe(saved, next);
  expect(applied.differences).toEqual([]);
  expect(applied.questions).toEqual([]);
  expect(applied.recipe).toEqual({ ...saved, dialect: next.proposed.dialect });
});

it("takes the layout from the file itself: a longer preamble moves the first row", () => {
  const next = evidenceOf(["Site,North Hall", "Logger,A1", ""].concat(plain));
  const { recipe } = applyRecipe(saved, next);
  expect(recipe.dialect.firstDataLine).toBe(next.proposed.dialect.firstDataLine);
  expect(recipe.dialect.firstDataLine).toBeGreaterThan(saved.dialect.firstDataLine);
});

it("asks for the order of dates that the file disproves, and names the line", () => {
  const next = evidenceOf(
    ["Time,Flow,Supply,Return"].concat(
      rows((minute) => `04/13/2026 08:${two(minute)},12.5,44.5,54.25`),
    ),
  );
  const applied = applyRecipe(saved, next);
  expect(applied.differences).toEqual([
    expect.objectContaining({ code: "dateOrder", saved: "dayMonthYear", asks: true }),
  ]);
  expect(applied.differences[0]?.found).toMatch(/^04\/13\/2026/);
  expect(applied.recipe.time.format).toEqual({ kind: "calendar", order: null });
});

it("asks for a unit where the header now names another one", () => {
  const next = evidenceOf(["Time,Flow [L/min],Supply,Return"].concat(plain.slice(1)));
  const renamed = {
    ...saved,
    columns: saved.columns.map((column) =>
      column.meaning === "flow" ? { ...column, header: "Flow [L/min]" } : column,
    ),
  };
  const applied = applyRecipe(renamed, next);
  expect(applied.differences).toEqual([
    expect.objectContaining({ code: "unit", saved: "L/s", found: "L/min", asks: true }),
  ]);
  expect(applied.recipe.columns[1]?.unit).toBeNull();
});

it("asks for a unit under which no water could have these temperatures", () => {
  const celsius = ["Time,Flow,Supply,Return"].concat(
    rows((minute) => `03/04/2026 08:${two(minute)},12.5,6.5,12.25`),
  );
  const applied = applyRecipe(saved, evidenceOf(celsius));
  expect(codes(applied)).toEqual(["implausible", "implausible"]);
  expect(applied.differences[0]).toMatchObject({ saved: "degF", found: "6.5", asks: true });
  expect(applied.recipe.columns.map(({ unit }) => unit)).toEqual([null, "L/s", null, null]);
});

it("asks for a unit under which the water would run faster than in any pipe", () => {
  const narrow = evidenceOf(plain, { insideDiameterMm: 40 });
  expect(codes(applyRecipe(saved, narrow))).toEqual(["implausible"]);
  const unknown = evidenceOf(plain, { insideDiameterMm: null });
  expect(codes(applyRecipe(saved, unknown))).toEqual([]);
});

it("does not take a few words for no reading, written as numbers, for another unit", () => {
  const next = evidenceOf(
    ["Time,Flow,Supply,Return"].concat(
      rows((minute) => `03/04/2026 08:${two(minute)},12.5,${minute % 9 ? "44.5" : "-9999"},54.25`),
    ),
  );
  expect(codes(applyRecipe(saved, next))).toEqual([]);
});

it("asks for the decimal mark that the file disproves", () => {
  const next = evidenceOf(
    ["Time;Flow;Supply;Return"].concat(
      rows((minute) => `03/04/2026 08:${two(minute)};12,${minute % 10}25;44,5;54,25`),
    ),
  );
  const applied = applyRecipe(saved, next);
  expect(codes(applied)).toContain("separator");
  const marks = applied.differences.filter(({ code }) => code === "decimalMark");
  expect(marks.map(({ column }) => column)).toEqual(["Flow", "Supply", "Return"]);
  expect(marks.every(({ asks, line }) => asks && line !== null)).toBe(true);
  expect(applied.questions.map(({ code }) => code)).toEqual(Array(3).fill("decimalMark"));
});

it("finds a column that has moved by its header, and says so without asking", () => {
  const next = evidenceOf(
    ["Time,Supply,Return,Flow"].concat(
      rows((minute) => `03/04/2026 08:${two(minute)},44.5,54.25,12.${minute % 10}`),
    ),
  );
  const applied = applyRecipe(saved, next);
  expect(applied.recipe.columns.map(({ meaning }) => meaning)).toEqual([
    "time",
    "supply",
    "return",
    "flow",
  ]);
  expect(codes(applied)).toEqual(["columnMoved", "columnMoved", "columnMoved"]);
  expect(applied.questions).toEqual([]);
});

it("asks for a column that is not there, and leaves what is new to be seen", () => {
  const next = evidenceOf(
    ["Time,Flow,Supply,Signal [%]"].concat(
      rows((minute) => `03/04/2026 08:${two(minute)},12.${minute % 10},44.5,88`),
    ),
  );
  const applied = applyRecipe(saved, next);
  expect(applied.differences).toEqual([
    expect.objectContaining({
      code: "columnMissing",
      column: "Return",
      saved: "return",
      asks: true,
    }),
    expect.objectContaining({
      code: "columnNew",
      column: "Signal [%]",
      found: "signal",
      asks: false,
    }),
  ]);
  expect(applied.questions).toEqual([{ code: "columnMeaning", meaning: "return" }]);
});

it("keeps what the header proves where the recipe means something else by it, and asks", () => {
  const swapped = {
    ...saved,
    columns: saved.columns.map((column): ColumnRecipe => {
      if (column.meaning === "supply") return { ...column, meaning: "return" };
      return column.meaning === "return" ? { ...column, meaning: "supply" } : column;
    }),
  };
  const named = ["Time,Flow,Supply temperature,Return temperature"].concat(plain.slice(1));
  const file = evidenceOf(named);
  const isProved = file.proofs.some(
    ({ about, columnIndex, certainty }) =>
      about === "columnMeaning" && columnIndex === 2 && certainty === "proved",
  );
  const renamed = {
    ...swapped,
    columns: swapped.columns.map((column, i) => ({
      ...column,
      header: file.proposed.columns[i]?.header ?? "",
    })),
  };
  const applied = applyRecipe(renamed, file);
  expect(isProved).toBe(true);
  expect(codes(applied)).toEqual(["meaning", "meaning"]);
  expect(applied.recipe.columns[2]?.meaning).toBe("supply");
});

it("asks for the clock where the file states another one", () => {
  const next = evidenceOf(["Time zone,UTC+1"].concat(plain));
  const applied = applyRecipe(saved, next);
  expect(applied.differences).toEqual([
    expect.objectContaining({ code: "clock", saved: "utc", found: "fixedOffset 60", asks: true }),
  ]);
  expect(applied.recipe.time.clock).toBeNull();
  expect(applied.questions).toEqual([{ code: "loggerClock" }]);
});

it("brings nothing of another file's history along: exchanges of a meter stay behind", () => {
  const metered = (header: string) =>
    evidenceOf(
      [header].concat(rows((minute) => `2026-04-03T08:${two(minute)}:00Z,${1000 + minute}.5`)),
    );
  const file = metered("Time,Heating energy [kWh]");
  const old: FileRecipe = {
    ...file.proposed,
    meter: { positivePower: null, exchangedAt: ["2026-01-01T00:00:00Z"] },
  };
  expect(applyRecipe(old, file).recipe.meter).toEqual({ positivePower: null, exchangedAt: [] });
});

it("asks for the kind of row where the header says means and the recipe moments", () => {
  const file = evidenceOf(["Time,Mean flow,Supply,Return"].concat(plain.slice(1)));
  const kind: FileEvidence = { ...file, proposed: { ...file.proposed, seriesKind: "meanToLabel" } };
  const moments = answered(file, { seriesKind: "instantaneous" });
  expect(codes(applyRecipe(moments, kind))).toEqual(["seriesKind"]);
  const chosen = { ...moments, kindChosen: true };
  expect(codes(applyRecipe(chosen, kind))).toEqual([]);
  expect(applyRecipe(chosen, kind).recipe).toMatchObject({
    seriesKind: "instantaneous",
    kindChosen: true,
  });
});
