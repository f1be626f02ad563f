import type { FileRecipe } from "@shared/domain/log-files/recipe";
import {
  columnSignOf,
  readColumnStarts,
  withColumnSign,
  withColumnStarts,
  withEncoding,
} from "./dialect-edits";

const recipe: FileRecipe = {
  dialect: {
    encoding: "utf-8",
    separator: " ",
    quote: '"',
    headerLine: 1,
    unitsLine: null,
    firstDataLine: 2,
  },
  columns: [],
  time: { format: { kind: "calendar", order: null }, clock: null },
  seriesKind: "instantaneous",
};

test("fixed width leaves its places to be found, and another sign leaves none behind", () => {
  const fixed = withColumnSign(recipe, "fixed");
  expect(fixed.dialect).toMatchObject({ separator: "\t", quote: null, columnStarts: [] });
  expect(columnSignOf(fixed)).toBe("fixed");
  const back = withColumnSign(withColumnStarts(fixed, [0, 9]), ";");
  expect(back.dialect).not.toHaveProperty("columnStarts");
  expect(columnSignOf(back)).toBe(";");
  expect(withEncoding(recipe, "windows-1252").dialect.encoding).toBe("windows-1252");
});

test("typed places begin at 0 and ascend, or are none", () => {
  expect(readColumnStarts("0, 11, 21")).toEqual([0, 11, 21]);
  expect(readColumnStarts("11 21")).toEqual([0, 11, 21]);
  for (const text of ["", "0", "0, 5, 5", "0, 9, 4", "a, b", "0, 2000"])
    expect(readColumnStarts(text)).toBeNull();
});
