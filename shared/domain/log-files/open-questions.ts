import { needsUnit } from "./column-units";
import type { ChannelMeaning } from "./raw-rows";
import type { FileRecipe } from "./recipe";

/** An answer a recipe still lacks before its file can be read (`dateOrder`, `timeColumn`) or resolved. */
export type OpenQuestion =
  | { readonly code: "dateOrder" }
  | { readonly code: "timeColumn" }
  | { readonly code: "pulseValue" | "statusWords"; readonly columnIndex: number }
  | { readonly code: UnitQuestionCode; readonly columnIndex: number };

export type UnitQuestionCode = "flowUnit" | "temperatureUnit" | "columnUnit";

/** Which question asks for the unit of a column of this meaning. */
export function unitQuestionOf(meaning: ChannelMeaning): UnitQuestionCode {
  if (meaning === "flow") return "flowUnit";
  const isTemperature = meaning === "supply" || meaning === "return" || meaning === "outdoor";
  return isTemperature ? "temperatureUnit" : "columnUnit";
}

/** What keeps a recipe from being used, in the order of the wizard. The clock is asked by {@link resolveRows}. */
export function openQuestions(recipe: FileRecipe): readonly OpenQuestion[] {
  const questions: OpenQuestion[] = [];
  const has = (meaning: string): boolean =>
    recipe.columns.some((column) => column.meaning === meaning);
  if (!has("time") && !has("date")) questions.push({ code: "timeColumn" });
  for (const { index, meaning, unit, pulseValue, badWords } of recipe.columns) {
    if (meaning === "pulses") {
      // Its worth is a number and a unit, which no file proves: one question for both.
      if (unit === null || (pulseValue ?? null) === null)
        questions.push({ code: "pulseValue", columnIndex: index });
      continue;
    }
    if (meaning === "status" && badWords === undefined)
      questions.push({ code: "statusWords", columnIndex: index });
    if (unit === null && needsUnit(meaning))
      questions.push({ code: unitQuestionOf(meaning), columnIndex: index });
  }
  if (recipe.time.format.kind === "calendar" && recipe.time.format.order === null)
    questions.push({ code: "dateOrder" });
  return questions;
}
