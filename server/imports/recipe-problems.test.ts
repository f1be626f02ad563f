import type { DateOrder, FileRecipe } from "@shared/domain/log-files/recipe";
import type { RecognitionFindings } from "@server/models/log-file";
import { recipeProblems } from "./recipe-problems";

const recipe = (order: DateOrder): FileRecipe => ({
  dialect: {
    encoding: "utf-8",
    separator: ",",
    quote: null,
    headerLine: 1,
    unitsLine: null,
    firstDataLine: 2,
  },
  columns: [
    { index: 0, header: "Time", meaning: "time", unit: null, decimalMark: "." },
    { index: 1, header: "Flow", meaning: "flow", unit: "m3/h", decimalMark: "." },
  ],
  time: { format: { kind: "calendar", order }, clock: { kind: "utc" } },
  seriesKind: "instantaneous",
});

const findings = (cell: string): RecognitionFindings => ({
  asked: [],
  proofs: [{ about: "dateOrder", columnIndex: 0, line: 49, cell, certainty: "proved" }],
  firstLines: [],
  sampleRows: [],
  dataRowCount: 96,
  columnCount: 2,
  preamble: [],
});

const codes = (order: DateOrder, cell: string) =>
  recipeProblems(recipe(order), findings(cell)).map(({ code }) => code);

test("a date order that a row of the file disproves is refused, naming the row", () => {
  expect(codes("monthDayYear", "13/07/2025 00:00")).toEqual(["disproved"]);
  expect(
    recipeProblems(recipe("monthDayYear"), findings("13/07/2025 00:00"))[0]?.message,
  ).toContain("Line 49");
  expect(codes("dayMonthYear", "2025-07-13 00:00")).toEqual(["disproved"]);
});

test("the order that the row proves is taken, two-digit years too", () => {
  expect(codes("dayMonthYear", "13/07/2025 00:00")).toEqual([]);
  expect(codes("yearMonthDay", "2025-07-13 00:00")).toEqual([]);
  expect(codes("yearMonthDay", "25/07/13 00:00")).toEqual([]);
});
