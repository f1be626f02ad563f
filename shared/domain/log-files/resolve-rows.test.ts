import cells from "@test/fixtures/import-cells.json";
import { readLogFixture } from "@test/fixtures/log-files/read-fixture";
import { RowQuality } from "../readings/reading-columns";
import { createLogReader } from "./log-reader";
import { DEFAULT_REPAIR_CHOICES, type FileRecipe, type RepairChoices } from "./recipe";
import { recogniseLogFile } from "./recognise-log-file";
import { resolveRows, type ResolvedRows } from "./resolve-rows";

const PARIS = "Europe/Paris";

interface Answers {
  readonly choices?: Partial<RepairChoices>;
  readonly recipe?: (recipe: FileRecipe) => FileRecipe;
  readonly zone?: string;
}

/** Recognises, reads and resolves; the clock is the site's unless the file or `recipe` says otherwise. */
function resolve(
  source: string | Uint8Array,
  { choices, recipe: change, zone = PARIS }: Answers = {},
): ResolvedRows {
  const bytes = typeof source === "string" ? new TextEncoder().encode(source) : source;
  const found = recogniseLogFile(bytes);
  if ("code" in found) throw new Error(found.code);
  const settled: FileRecipe = {
    ...found.recipe,
    time: { ...found.recipe.time, clock: found.recipe.time.clock ?? { kind: "site" } },
  };
  const recipe = change === undefined ? settled : change(settled);
  const reader = createLogReader(recipe);
  reader.push(bytes);
  return resolveRows(reader.end(), recipe, { ...DEFAULT_REPAIR_CHOICES, ...choices }, zone);
}

const fixture = (name: string, answers?: Answers): ResolvedRows =>
  resolve(readLogFixture(name), answers);
const instants = ({ columns }: ResolvedRows): string[] =>
  [...(columns?.instantMs ?? [])].map((ms) => new Date(ms).toISOString().slice(0, 16));
const stepOf = (resolved: ResolvedRows, code: string) =>
  resolved.steps.find((step) => step.code === code);
const flows = ({ columns }: ResolvedRows): number[] => [...(columns?.flowM3PerHour ?? [])];
const cell = (id: string) =>
  (cells as readonly { id: string }[]).find((other) => other.id === id) as unknown as Record<
    string,
    unknown
  >;

describe("the hour that clocks show twice", () => {
  it("is told apart by the order of the rows, none dropped (cell B17)", () => {
    const { text, value } = cell("B17") as { text: string[]; value: string[] };
    const file = ["Time,Flow m³/h", ...text.map((time, i) => `${time},1${i}.5`)].join("\n");
    expect(instants(resolve(file)).map((at) => `${at}Z`)).toEqual(value);
    const autumn = fixture("not-ok/autumn-hour-repeated.csv");
    expect(instants(autumn)).toEqual(
      ["23:30", "00:00", "00:30", "01:00", "01:30", "02:00"].map(
        (time, i) => `2025-10-${i === 0 ? 25 : 26}T${time}`,
      ),
    );
    expect(stepOf(autumn, "repeatedHour")).toMatchObject({
      count: 4,
      countByKind: { "+02:00": 2, "+01:00": 2 },
    });
    expect(stepOf(autumn, "identicalRepeats")).toBeUndefined();
  });

  it.each([
    ["hourly labels", ["01:00", "02:00", "02:00", "03:00"], ["23:00", "00:00", "01:00", "02:00"]],
    [
      "a swapped pair in the second pass",
      ["02:00", "02:20", "02:40", "02:00", "02:40", "02:20", "03:00"],
      ["00:00", "00:20", "00:40", "01:00", "01:20", "01:40", "02:00"],
    ],
    [
      "newest first",
      ["03:00", "02:30", "02:00", "02:30", "02:00", "01:30"],
      ["23:30", "00:00", "00:30", "01:00", "01:30", "02:00"],
    ],
    [
      "a gap over the first pass",
      ["01:20", "01:40", "02:20", "02:40", "03:00", "03:20"],
      ["23:20", "23:40", "01:20", "01:40", "02:00", "02:20"],
    ],
  ])("holds for %s", (_, labels, expected) => {
    const file = [
      "Time,Flow m³/h",
      ...labels.map((label, i) => `2025-10-26 ${label},1${i}.5`),
    ].join("\n");
    expect(instants(resolve(file)).map((at) => at.slice(11))).toEqual(expected);
  });

  it("keeps both passes of shuffled rows, and calls them unclear", () => {
    // Found by hand: 02:00 and 02:30 stand twice, so the two hours have all four rows between them.
    const labels = "02:30 01:00 03:00 02:00 04:00 02:30 03:30 01:30 02:00".split(" ");
    const file = ["Time,Flow m³/h", ...labels.map((label) => `2025-10-26 ${label},10`)].join("\n");
    const shuffled = resolve(file);
    expect(instants(shuffled).map((at) => at.slice(11))).toEqual(
      "23:00 23:30 00:00 00:30 01:00 01:30 02:00 02:30 03:00".split(" "),
    );
    expect(stepOf(shuffled, "repeatedHour")?.countByKind).toEqual({ unclear: 4 });
    expect(stepOf(shuffled, "identicalRepeats")).toBeUndefined();
  });

  it("is called unclear when the file begins and ends within it", () => {
    const file = ["Time,Flow m³/h", "2025-10-26 02:10,10.5", "2025-10-26 02:20,10.6"].join("\n");
    expect(stepOf(resolve(file), "repeatedHour")?.countByKind).toEqual({ unclear: 2 });
  });

  it("is called unclear when a gap leaves either pass possible", () => {
    const labels = ["00:40", "00:50", "01:00", "02:30", "02:40", "04:00", "04:10", "04:20"];
    const file = [
      "Time,Flow m³/h",
      ...labels.map((label, i) => `2025-10-26 ${label},1${i}.5`),
    ].join("\n");
    expect(stepOf(resolve(file), "repeatedHour")?.countByKind).toEqual({ unclear: 2 });
  });
});

describe("the hour that clocks jump over", () => {
  it("is left out and listed, or read as if the clock had not moved", () => {
    const left = fixture("not-ok/spring-hour-missing.csv");
    expect(instants(left)).toEqual([
      "2026-03-29T00:00",
      "2026-03-29T00:30",
      "2026-03-29T01:00",
      "2026-03-29T01:30",
    ]);
    expect(stepOf(left, "missingHour")).toMatchObject({
      count: 2,
      examples: [{ line: 4 }, { line: 5 }],
    });
    // Read on, 02:00 is the same instant as 03:00: the two rows now contradict each other.
    const read = fixture("not-ok/spring-hour-missing.csv", {
      choices: { missingHour: "readAsBeforeChange" },
    });
    expect(read.questions).toMatchObject([{ code: "conflictingRepeats", count: 2 }]);
  });

  it("does not exist on a fixed offset or in UTC", () => {
    const fixed = fixture("not-ok/spring-hour-missing.csv", {
      recipe: (recipe) => ({
        ...recipe,
        time: { ...recipe.time, clock: { kind: "fixedOffset", offsetMinutes: 60 } },
      }),
    });
    expect(instants(fixed)).toHaveLength(6);
    expect(instants(fixed)[0]).toBe("2026-03-29T00:00");
  });
});

describe("repeated and misplaced rows", () => {
  it("drop identical repeats by count, and ask about conflicting ones", () => {
    const open = fixture("not-ok/duplicates-conflicting.csv");
    expect(open.columns).toBeNull();
    expect(open.questions).toMatchObject([
      { code: "conflictingRepeats", count: 1, examples: [{ line: 6 }] },
    ]);
    const first = fixture("not-ok/duplicates-conflicting.csv", {
      choices: { conflictingRepeats: "keepFirst" },
    });
    expect(flows(first)).toEqual([6.7, 6.71, 6.72, 6.73]);
    expect(stepOf(first, "identicalRepeats")).toMatchObject({ count: 1, examples: [{ line: 4 }] });
    expect(
      flows(
        fixture("not-ok/duplicates-conflicting.csv", {
          choices: { conflictingRepeats: "keepLast" },
        }),
      ),
    ).toEqual([6.7, 6.71, 6.92, 6.73]);
    expect(
      flows(
        fixture("not-ok/duplicates-conflicting.csv", {
          choices: { conflictingRepeats: "leaveOutAll" },
        }),
      ),
    ).toEqual([6.7, 6.71, 6.73]);
  });

  it("are sorted and shown, or left out", () => {
    const sorted = fixture("not-ok/shuffled-rows.csv");
    expect(flows(sorted)).toEqual([6.7, 6.71, 6.72, 6.73, 6.74]);
    expect([...sorted.line]).toEqual([2, 4, 3, 5, 6]);
    expect(stepOf(sorted, "outOfOrder")).toMatchObject({
      count: 1,
      examples: [{ line: 4 }],
      countByKind: { single: 1 },
    });
    expect(
      flows(fixture("not-ok/shuffled-rows.csv", { choices: { outOfOrder: "leaveOut" } })),
    ).toEqual([6.7, 6.72, 6.73, 6.74]);
  });
});

describe("cells without a reading", () => {
  it("are counted by kind and never become zero, while a stopped pump stays zero", () => {
    const resolved = fixture("not-ok/sentinels.csv");
    expect(stepOf(resolved, "sentinels")?.countByKind).toEqual({
      "-9999": 1,
      OL: 1,
      "3276.7": 3,
      "+OL": 1,
      "9.9E37": 1,
      "#N/A": 1,
      "no data": 1,
      "": 1,
    });
    expect(flows(resolved)).toEqual([6.7, NaN, NaN, 6.73, 6.74, 6.75, 6.76, 0, 0, 0, 6.8]);
    expect([...(resolved.columns?.supplyC ?? [])].slice(2, 7)).toEqual([6.32, NaN, NaN, NaN, 6.36]);
    expect([...(resolved.columns?.quality ?? [])]).toEqual([0, 2, 2, 2, 2, 2, 2, 2, 2, 0, 0]);
    expect(resolved.counts).toMatchObject({
      read: 11,
      kept: 11,
      measured: 3,
      noReading: 8,
      missing: 0,
    });
  });

  it("come back as written when the step is undone", () => {
    const undone = fixture("not-ok/sentinels.csv", { choices: { sentinels: "asWritten" } });
    expect(flows(undone).slice(0, 3)).toEqual([6.7, -9999, NaN]);
    expect(stepOf(undone, "sentinels")?.count).toBe(10);
  });
});

describe("a weak signal", () => {
  const withUnit = (recipe: FileRecipe): FileRecipe => ({
    ...recipe,
    columns: recipe.columns.map((column) =>
      column.meaning === "flow" ? { ...column, unit: "m3/h" } : column,
    ),
  });

  it("is asked about, and excluded rows keep their values", () => {
    expect(fixture("not-ok/flow-without-unit.csv", { recipe: withUnit }).questions).toMatchObject([
      { code: "weakSignal", count: 3 },
    ]);
    const excluded = fixture("not-ok/flow-without-unit.csv", {
      recipe: withUnit,
      choices: { weakSignal: "exclude" },
    });
    expect(
      [...(excluded.columns?.quality ?? [])].filter((code) => code === RowQuality.excluded),
    ).toHaveLength(3);
    expect(flows(excluded).some(Number.isNaN)).toBe(false);
    expect(
      fixture("not-ok/flow-without-unit.csv", { recipe: withUnit, choices: { weakSignal: "keep" } })
        .counts.excluded,
    ).toBe(0);
  });

  it("waits for the flow unit as well", () => {
    expect(fixture("not-ok/flow-without-unit.csv").questions[0]).toEqual({
      code: "flowUnit",
      columnIndex: 1,
    });
  });
});

describe("units", () => {
  it("become m³/h and °C while the originals stay beside them (cells B26 and B27)", () => {
    const { F, C } = (cell("B26") as { f_values: { F: number[]; C: number[] } }).f_values;
    const { gpm, m3h } = cell("B27") as { gpm: number; m3h: number };
    const file = [
      "Time,Flow [gpm],Supply [°F],Return [°F]",
      ...F.map((f, i) => `2025-01-01 0${i}:00,${gpm},${f},${f}`),
    ].join("\n");
    const resolved = resolve(file);
    flows(resolved).forEach((flow) => expect(flow).toBeCloseTo(m3h, 5));
    [...(resolved.columns?.supplyC ?? [])].forEach((celsius, i) =>
      expect(celsius).toBeCloseTo(C[i] as number, 6),
    );
    expect(
      resolved.original.map(({ unit, decimals, values }) => [unit, decimals, [...values]]),
    ).toEqual([
      ["US gpm", 0, [gpm, gpm, gpm]],
      ["degF", 0, F],
      ["degF", 0, F],
    ]);
    expect(stepOf(resolved, "unitConversion")).toMatchObject({
      count: 9,
      countByKind: { "flow: US gpm → m3/h": 3 },
    });
  });
});

describe("gaps", () => {
  it("are steps over three nominal ones, with the rows missing and the flow on both sides", () => {
    const minutes = [0, 1, 2, 3, 6, 7, 20, 21];
    const file = [
      "Time,Flow m³/h",
      ...minutes.map((m) => `2025-01-01 00:${String(m).padStart(2, "0")},1${m}.5`),
    ].join("\n");
    const { gaps, nominalStepMs, counts } = resolve(file, { zone: "UTC" });
    expect(nominalStepMs).toBe(60_000);
    expect(gaps).toEqual([
      {
        fromMs: Date.UTC(2025, 0, 1, 0, 7),
        toMs: Date.UTC(2025, 0, 1, 0, 20),
        missingRows: 12,
        flowBeforeM3PerHour: 17.5,
        flowAfterM3PerHour: 120.5,
      },
    ]);
    expect(counts).toMatchObject({ expected: 22, missing: 14, kept: 8 });
  });
});

describe("the clock", () => {
  it("is asked when nobody has said it, and not when every cell carries its offset", () => {
    const noClock = (recipe: FileRecipe): FileRecipe => ({
      ...recipe,
      time: { ...recipe.time, clock: null },
    });
    expect(fixture("not-ok/shuffled-rows.csv", { recipe: noClock })).toMatchObject({
      columns: null,
      questions: [{ code: "loggerClock" }],
    });
    expect(instants(fixture("ok/iso-with-offset.csv", { recipe: noClock }))).toEqual([
      "2025-10-26T00:30",
      "2025-10-26T01:30",
      "2025-10-26T02:30",
    ]);
  });
});
