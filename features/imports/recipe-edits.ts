import type {
  ColumnMeaning,
  ColumnRecipe,
  ColumnUnit,
  DateOrder,
  DecimalMark,
  FileRecipe,
  FlowUnit,
  LoggerClock,
  TemperatureUnit,
} from "@shared/domain/log-files/recipe";

export const COLUMN_MEANINGS: readonly ColumnMeaning[] = [
  "time",
  "date",
  "timeOfDay",
  "flow",
  "supply",
  "return",
  "signal",
  "skip",
];
export const FLOW_UNITS: readonly FlowUnit[] = ["m3/h", "L/s", "L/min", "US gpm"];
export const TEMPERATURE_UNITS: readonly TemperatureUnit[] = ["degC", "degF", "K"];

/** Units a column of this meaning can have; none for times and skipped columns. */
export function unitsOf(meaning: ColumnMeaning): readonly ColumnUnit[] {
  switch (meaning) {
    case "flow":
      return FLOW_UNITS;
    case "supply":
    case "return":
      return TEMPERATURE_UNITS;
    case "signal":
      return ["%"];
    default:
      return [];
  }
}

export const isTime = (meaning: ColumnMeaning): boolean =>
  meaning === "time" || meaning === "date" || meaning === "timeOfDay";

function edit(recipe: FileRecipe, change: (column: ColumnRecipe) => ColumnRecipe): FileRecipe {
  return { ...recipe, columns: recipe.columns.map(change) };
}

/**
 * Gives a column a meaning. Whoever held that meaning is skipped from now on, since a file has one
 * column of each; a unit that does not fit is dropped, and only a sole unit is filled in.
 */
export function withMeaning(recipe: FileRecipe, index: number, meaning: ColumnMeaning): FileRecipe {
  const units = unitsOf(meaning);
  return edit(recipe, (column) => {
    if (column.index === index) {
      const kept = units.find((unit) => unit === column.unit) ?? null;
      return { ...column, meaning, unit: kept ?? (units.length === 1 ? (units[0] ?? null) : null) };
    }
    const taken = meaning !== "skip" && column.meaning === meaning;
    const clash =
      (meaning === "time" && isTime(column.meaning)) ||
      (isTime(meaning) && column.meaning === "time");
    return taken || clash ? { ...column, meaning: "skip", unit: null } : column;
  });
}

export function withUnit(recipe: FileRecipe, index: number, unit: ColumnUnit): FileRecipe {
  return edit(recipe, (column) => (column.index === index ? { ...column, unit } : column));
}

export function withDecimalMark(
  recipe: FileRecipe,
  index: number,
  decimalMark: DecimalMark,
): FileRecipe {
  return edit(recipe, (column) => (column.index === index ? { ...column, decimalMark } : column));
}

export function withDateOrder(recipe: FileRecipe, order: DateOrder): FileRecipe {
  return { ...recipe, time: { ...recipe.time, format: { kind: "calendar", order } } };
}

export function withClock(recipe: FileRecipe, clock: LoggerClock): FileRecipe {
  return { ...recipe, time: { ...recipe.time, clock } };
}

/** Another header line moves the start of the data below it; the server then reads the file anew. */
export function withHeaderLine(recipe: FileRecipe, headerLine: number | null): FileRecipe {
  return {
    ...recipe,
    dialect: {
      ...recipe.dialect,
      headerLine,
      unitsLine: null,
      firstDataLine: headerLine === null ? 1 : headerLine + 1,
    },
  };
}
