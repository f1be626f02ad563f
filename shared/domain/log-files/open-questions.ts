import type { FileRecipe } from "./recipe";

/** An answer a recipe still lacks before its file can be read (`dateOrder`, `timeColumn`) or resolved. */
export type OpenQuestion =
  | { readonly code: "dateOrder" }
  | { readonly code: "timeColumn" }
  | { readonly code: "flowUnit" | "temperatureUnit"; readonly columnIndex: number };

/** What keeps a recipe from being used, in the order of the wizard. The clock is asked by {@link resolveRows}. */
export function openQuestions(recipe: FileRecipe): readonly OpenQuestion[] {
  const questions: OpenQuestion[] = [];
  const has = (meaning: string): boolean =>
    recipe.columns.some((column) => column.meaning === meaning);
  if (!has("time") && !has("date")) questions.push({ code: "timeColumn" });
  for (const { index, meaning, unit } of recipe.columns) {
    if (unit !== null) continue;
    if (meaning === "flow") questions.push({ code: "flowUnit", columnIndex: index });
    if (meaning === "supply" || meaning === "return")
      questions.push({ code: "temperatureUnit", columnIndex: index });
  }
  if (recipe.time.format.kind === "calendar" && recipe.time.format.order === null)
    questions.push({ code: "dateOrder" });
  return questions;
}
