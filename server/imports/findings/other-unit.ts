import type { FindingChoice } from "@shared/domain/readings/checks/finding";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { fromM3PerHour, toM3PerHour } from "@shared/domain/units/flow";
import { fromCelsius, toCelsius } from "@shared/domain/units/temperature";
import type { CheckedFile } from "../file-checks";
import { unitsOf } from "./find-findings";

type UnitChoice = Extract<FindingChoice, { change: "unit" }>;

/** Files with one of them read in another unit; null where no such file is there. */
export function withUnit(
  files: readonly CheckedFile[],
  fileId: string | null,
  choice: UnitChoice,
): readonly CheckedFile[] | null {
  const file = files.find((each) => each.fileId === fileId);
  if (!file || file.columns === null) return null;
  const { flowUnit, temperatureUnit } = unitsOf(file.recipe);
  const { columns } = file;
  const read = (values: Float64Array | null) => {
    if (values === null) return null;
    if (choice.channel === "flow") {
      const factor = flowUnit === null ? NaN : toM3PerHour(fromM3PerHour(1, flowUnit), choice.unit);
      return values.map((value) => value * factor);
    }
    return temperatureUnit === null
      ? values.map(() => NaN)
      : values.map((value) => toCelsius(fromCelsius(value, temperatureUnit), choice.unit));
  };
  const changed =
    choice.channel === "flow"
      ? { ...columns, flowM3PerHour: read(columns.flowM3PerHour) }
      : { ...columns, supplyC: read(columns.supplyC), returnC: read(columns.returnC) };
  return files.map((each) => (each === file ? { ...file, columns: changed } : each));
}

/** The recipe with a choice's unit on the columns it is about. */
export function recipeInUnit(recipe: FileRecipe, choice: UnitChoice): FileRecipe {
  const meanings = choice.channel === "flow" ? ["flow"] : ["supply", "return"];
  return {
    ...recipe,
    columns: recipe.columns.map((column) =>
      meanings.includes(column.meaning) ? { ...column, unit: choice.unit } : column,
    ),
  };
}
