import cells from "@test/fixtures/import-cells.json";
import { importText, type SaidOfFile } from "@test/generators/import-text";
import { shortSeries } from "@test/generators/clean-series";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { reversedFlow } from "@shared/domain/readings/checks/reversed-flow";
import { stuckChannels } from "@shared/domain/readings/checks/stuck-channel";
import { counterMeans, NO_COUNTER_FACTS } from "@shared/domain/readings/counter-steps";
import { resolveSegments } from "@shared/domain/readings/resolve-segments";
import { fromM3PerHour } from "@shared/domain/units/flow";

/*
 * Every worked cell of the import, written into a small file as a logger writes it and read by the
 * same code as an import. Each cell is run: one that is added to the list without a test here fails.
 */
type Cell = (typeof cells)[number];

const HOUR_MS = 3_600_000;
const UTC: SaidOfFile = { clock: { kind: "utc" } };

/** Flows of a semicolon file beside quarter-hours; the second row proves the decimal mark. */
function numbersIn(texts: readonly string[], said = UTC): number[] {
  const rows = texts.map((text, i) => `2025-07-15 ${String(10 + i)}:00;"${text}"`);
  const { resolved } = importText(["Time;Flow [m³/h]", ...rows, ""].join("\n"), said);
  return [...resolved.original[0]!.values];
}

/** Instants of a file with these cells as its times. */
function timesIn(texts: readonly string[], said: SaidOfFile = UTC): string[] {
  const rows = texts.map((text, i) => `${text};${i + 1},5`);
  const { resolved } = importText(["Timestamp;Flow [m³/h]", ...rows, ""].join("\n"), said);
  return [...resolved.columns!.instantMs].map((ms) => new Date(ms).toISOString());
}

const isoOf = (text: string) => new Date(/Z$/.test(text) ? text : `${text}Z`).toISOString();
const textOf = ({ text }: Cell) => text as string;

const checks: Record<string, (cell: Cell) => void> = {
  B01({ text }) {
    const rows = (text as string[]).map((cell, i) => `${cell};${i + 1},5`);
    const { recognition, asked } = importTextUnanswered(rows);
    expect(asked).toContain("dateOrder");
    expect(recognition.questions.find(({ code }) => code === "dateOrder")).toMatchObject({
      choices: ["dayMonthYear", "monthDayYear"],
      // Two days against the 61 between 4 March and 4 May: shown, and left to a person.
      stepSeconds: [2 * 86_400, 61 * 86_400],
    });
    expect(recognition.recipe.time.format).toEqual({ kind: "calendar", order: null });
  },
  B03: (cell) => expect(numbersIn([textOf(cell), "0,5"])[0]).toBe(cell.value),
  B04(cell) {
    const narrow = textOf(cell).replace(/\s/u, "\u202f");
    expect(numbersIn([narrow, "0,5"])[0]).toBe(cell.value);
    expect(numbersIn([textOf(cell), "0,5"])[0]).toBe(cell.value);
  },
  B05: (cell) => expect(numbersIn([textOf(cell), "0.5"])[0]).toBe(cell.value),
  B07({ register, capacity, deltas, flag }) {
    const rows = register!.map((count, i) => `2025-07-15 ${String(10 + i)}:00;${count}`);
    const { resolved } = importText(["Time;Volume [m³]", ...rows, ""].join("\n"), UTC);
    expect([...resolved.columns!.volumeCounterM3!]).toEqual(register);
    const { columns, events } = counterMeans(resolved.columns!, "instantaneous", HOUR_MS, {
      ...NO_COUNTER_FACTS,
      volume: { capacity: capacity!, mostPerHour: 50 },
      gapFactor: 3,
    });
    const passed = [...columns.flowM3PerHour!].slice(1).map((flow) => Math.round(flow * 1e9) / 1e9);
    expect(passed).toEqual(deltas);
    expect(events.map(({ kind }) => kind)).toEqual([flag]);
  },
  B09({ pulses, litres_per_pulse, m3 }) {
    // The row before opens the first step, so that each of the three counts.
    const rows = [0, ...pulses!].map((count, i) => `2025-07-15 ${String(10 + i)}:00;${count}`);
    const text = ["Time;Pulses", ...rows, ""].join("\n");
    expect(importText(text, UTC).asked).toContain("pulseValue");
    expect(importText(text, UTC).resolved.columns).toBeNull();
    const recipe = (found: FileRecipe): FileRecipe => ({
      ...found,
      columns: found.columns.map((column) =>
        column.meaning === "pulses"
          ? { ...column, unit: "L", pulseValue: litres_per_pulse! }
          : column,
      ),
    });
    const { resolved } = importText(text, { ...UTC, recipe });
    const volumes = [...resolved.columns!.flowM3PerHour!];
    expect(volumes[0]).toBeNaN();
    expect(volumes.slice(1).map((volume) => Math.round(volume * 1e9) / 1e9)).toEqual(m3);
    expect(resolved.steps.find(({ code }) => code === "pulseOpening")?.count).toBe(1);
  },
  B10: (cell) => expect(timesIn([textOf(cell)])).toEqual([isoOf(cell.value as string)]),
  B12: (cell) =>
    expect(timesIn([textOf(cell), "45853.75", "45854"])[0]).toBe(isoOf(cell.value as string)),
  B13: (cell) => expect(timesIn([textOf(cell)], {})).toEqual([isoOf(cell.value as string)]),
  B15: (cell) => expect(timesIn([textOf(cell)])).toEqual([isoOf(cell.value as string)]),
  B17: ({ text, zone, value }) =>
    expect(timesIn(text as string[], { clock: { kind: "site" }, zone })).toEqual(
      (value as string[]).map((instant) => new Date(instant).toISOString()),
    ),
  B20({ series }) {
    const flow = series!.map((_, row) => 30 + 6 * Math.sin(row / 3));
    const [finding] = stuckChannels(shortSeries({ flow, supply: series! }), {
      designDeltaTK: null,
    });
    expect(finding).toMatchObject({ channel: "supplyC", figures: { readings: 36, value: 7.42 } });
  },
  B22({ flow }) {
    const [finding] = reversedFlow(shortSeries({ flow: flow! }), NO_LIMITS);
    expect(finding).toMatchObject({
      code: "reversedFlow",
      figures: { negativeSharePercent: 100, medianM3PerHour: -31 },
    });
    // One sign for the whole series, or as it is: never the size of each row.
    expect(finding!.choices.map(({ change }) => change).sort()).toEqual(["flipFlow", "keep"]);
  },
  B25() {
    const minutes = (step: number, count: number) =>
      Array.from({ length: count }, (_, i) => Date.UTC(2025, 6, 15, 10) + i * step * 60_000);
    const flow = shortSeries({ flow: Array(21).fill(10) as number[] }, 60_000, minutes(1, 21));
    // The reading at 10:10 is there, those at 10:15 and 10:20 are not.
    const temperatures = shortSeries(
      { supply: [20, 21, 22], return: [10, 11, 12] },
      300_000,
      minutes(5, 3),
    );
    const source = ({ kind, nominalStepMs, columns }: typeof flow, precedence: number) => ({
      kind,
      nominalStepMs,
      columns,
      precedence,
    });
    const [segment] = resolveSegments([source(flow, 1), source(temperatures, 2)]);
    const supply = [...segment!.columns.supplyC!];
    expect(supply.slice(0, 3).map((value) => Math.round(value * 1e6) / 1e6)).toEqual([
      20, 20.2, 20.4,
    ]);
    // Never carried beyond the last reading.
    expect(supply.slice(11)).toEqual(Array(10).fill(NaN));
    const sparse = shortSeries({ supply: [20, 23], return: [10, 11] }, 300_000, [
      minutes(1, 1)[0]!,
      minutes(1, 16)[15]!,
    ]);
    const [apart] = resolveSegments([source(flow, 1), source(sparse, 2)]);
    expect(apart!.columns.supplyC![7]).toBeNaN();
  },
  B26({ f_values }) {
    const rows = f_values!.F.map((value, i) => `2025-07-15 ${String(10 + i)}:00;${value};${value}`);
    const { resolved } = importText(["Time;Supply [°F];Return [°F]", ...rows, ""].join("\n"), UTC);
    const celsius = [...resolved.columns!.supplyC!].map((value) => Math.round(value * 1e6) / 1e6);
    expect(celsius).toEqual(f_values!.C);
    expect(resolved.steps.find(({ code }) => code === "unitConversion")?.count).toBe(6);
  },
  B27({ gpm, m3h, L_s }) {
    const { resolved } = importText(`Time;Flow [gpm]\n2025-07-15 10:00;${gpm!}\n`, UTC);
    const flow = resolved.columns!.flowM3PerHour![0]!;
    expect(flow).toBeCloseTo(m3h!, 5);
    expect(fromM3PerHour(flow, "L/s")).toBeCloseTo(L_s!, 5);
  },
};

const NO_LIMITS = { boreMm: null };

function importTextUnanswered(rows: readonly string[]) {
  const text = ["Time;Flow [m³/h]", ...rows, ""].join("\n");
  const recipe = (found: FileRecipe): FileRecipe => ({
    ...found,
    time: { format: { kind: "calendar", order: "dayMonthYear" }, clock: { kind: "utc" } },
  });
  return importText(text, { recipe });
}

it.each(cells.map((cell) => [cell.id, cell] as const))(
  "%s is read as it was worked out",
  (id, cell) => {
    const check = checks[id];
    if (!check) throw new Error(`cell ${id} has no test`);
    check(cell);
  },
);
