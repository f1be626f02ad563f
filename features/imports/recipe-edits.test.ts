import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { withMeaning } from "./recipe-edits";

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
