import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { withBadWords, withMeaning, withPulseWorth, withSet } from "./recipe-edits";

const column = (
  index: number,
  meaning: FileRecipe["columns"][number]["meaning"],
  unit: FileRecipe["columns"][number]["unit"] = null,
) => ({ index, header: "", meaning, unit, decimalMark: "." }) as const;

const recipe: FileRecipe = {
  dialect: {
    encoding: "utf-8",
    separator: ",",
    quote: null,
    headerLine: 1,
    unitsLine: null,
    firstDataLine: 2,
  },
  columns: [
    column(0, "time"),
    column(1, "flow", "L/s"),
    column(2, "supply", "degF"),
    column(3, "skip"),
  ],
  time: { format: { kind: "calendar", order: "dayMonthYear" }, clock: null },
  seriesKind: "instantaneous",
};

test("a meaning moves from the column that held it", () => {
  const moved = withMeaning(recipe, 3, "flow");
  expect(moved.columns.map((c) => c.meaning)).toEqual(["time", "skip", "supply", "flow"]);
});

test("a temperature keeps its unit when supply becomes return, and a flow unit is never invented", () => {
  expect(withMeaning(recipe, 2, "return").columns[2]?.unit).toBe("degF");
  expect(withMeaning(recipe, 3, "flow").columns[3]?.unit).toBeNull();
});

test("splitting date and time of day takes the place of one time column", () => {
  const split = withMeaning(recipe, 3, "timeOfDay");
  expect(split.columns[0]?.meaning).toBe("skip");
});

test("water speed takes the place of a flow rate, and a pulse's worth goes with its meaning", () => {
  const speed = withMeaning(recipe, 3, "velocity");
  expect(speed.columns.map((c) => c.meaning)).toEqual(["time", "skip", "supply", "velocity"]);
  const pulses = withPulseWorth(withMeaning(recipe, 3, "pulses"), 3, { pulseValue: 10, unit: "L" });
  // Pulses are counted over a step: a moment would be no answer.
  expect(pulses.seriesKind).toBe("meanToLabel");
  expect(pulses.columns[3]).toMatchObject({ pulseValue: 10, unit: "L" });
  expect(withMeaning(pulses, 3, "volumeCounter").columns[3]).not.toHaveProperty("pulseValue");
  expect(withMeaning(pulses, 1, "flow").columns[3]).toEqual(column(3, "skip"));
});

test("no word at all is an answer to which mean a bad reading, and asking again takes it back", () => {
  const status = withMeaning(recipe, 3, "status");
  expect(status.columns[3]?.badWords).toBeUndefined();
  const none = withBadWords(status, 3, []);
  expect(none.columns[3]?.badWords).toEqual([]);
  expect(withBadWords(none, 3, null).columns[3]).not.toHaveProperty("badWords");
});

test("one of several points' sets is read, and the others stay skipped", () => {
  const blank: FileRecipe = {
    ...recipe,
    columns: [column(0, "time"), column(1, "skip"), column(2, "skip"), column(3, "skip")],
  };
  const set = {
    name: "south",
    columns: [
      { index: 2, meaning: "flow", unit: "m3/h" },
      { index: 3, meaning: "supply", unit: null },
    ],
  } as const;
  expect(withSet(blank, set).columns.map(({ meaning, unit }) => [meaning, unit])).toEqual([
    ["time", null],
    ["skip", null],
    ["flow", "m3/h"],
    ["supply", null],
  ]);
});
