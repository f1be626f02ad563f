import type { ColumnRecipe, FileRecipe } from "@shared/domain/log-files/recipe";
import type { FieldError } from "@server/http/errors";

const flowUnits = ["m3/h", "L/s", "L/min", "US gpm"];
const temperatureUnits = ["degC", "degF", "K"];

/** Units a column of this meaning may have; an empty list where it has none. */
function unitsOf(meaning: ColumnRecipe["meaning"]): readonly string[] {
  if (meaning === "flow") return flowUnits;
  if (meaning === "supply" || meaning === "return") return temperatureUnits;
  return meaning === "signal" ? ["%"] : [];
}

/** What makes a recipe unusable whatever the file holds: columns that contradict each other. */
export function recipeProblems(recipe: FileRecipe, columnCount: number): FieldError[] {
  const problems: FieldError[] = [];
  const add = (path: string, code: string, message: string) =>
    problems.push({ pointer: `/body/${path}`, code, message });
  const seen = new Map<string, number>();
  recipe.columns.forEach((column, i) => {
    const at = `columns/${i}`;
    if (column.index >= columnCount)
      add(`${at}/index`, "no-such-column", `The file has ${columnCount} columns.`);
    if (column.meaning === "skip") return;
    if (seen.has(column.meaning))
      add(`${at}/meaning`, "twice", `Two columns cannot both be ${column.meaning}. Skip one.`);
    seen.set(column.meaning, i);
    const units = unitsOf(column.meaning);
    if (column.unit !== null && !units.includes(column.unit))
      add(`${at}/unit`, "wrong-unit", `A ${column.meaning} column cannot be in ${column.unit}.`);
  });
  if (seen.has("time") && (seen.has("date") || seen.has("timeOfDay")))
    add("columns", "two-times", "Give either one time column or a date and a time of day.");
  if (!seen.has("flow") && !seen.has("supply") && !seen.has("return"))
    add("columns", "no-quantity", "Name at least a flow or a temperature column.");
  const { firstDataLine, headerLine, unitsLine } = recipe.dialect;
  for (const [name, line] of [
    ["headerLine", headerLine] as const,
    ["unitsLine", unitsLine] as const,
  ])
    if (line !== null && line >= firstDataLine)
      add(`dialect/${name}`, "after-data", "This line must stand before the first row of data.");
  return problems;
}
