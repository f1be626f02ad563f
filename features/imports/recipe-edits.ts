import { isCounter, unitsOfMeaning } from "@shared/domain/log-files/column-units";
import type { PositivePower } from "@shared/domain/readings/orient-power";
import type { SeriesKind } from "@shared/domain/readings/reading-columns";
import type {
  ColumnMeaning,
  ColumnRecipe,
  ColumnUnit,
  DateOrder,
  DecimalMark,
  FileRecipe,
  LoggerClock,
} from "@shared/domain/log-files/recipe";

export const COLUMN_MEANINGS: readonly ColumnMeaning[] = [
  "time",
  "date",
  "timeOfDay",
  "flow",
  "supply",
  "return",
  "signal",
  "power",
  "volumeCounter",
  "heatingCounter",
  "coolingCounter",
  "skip",
];

export const isTime = (meaning: ColumnMeaning): boolean =>
  meaning === "time" || meaning === "date" || meaning === "timeOfDay";

function edit(recipe: FileRecipe, change: (column: ColumnRecipe) => ColumnRecipe): FileRecipe {
  return { ...recipe, columns: recipe.columns.map(change) };
}

/** What a file may hold only one of: rate or counter of the water, power or counters of the heat. */
const RIVALS: Partial<Record<ColumnMeaning, readonly ColumnMeaning[]>> = {
  flow: ["volumeCounter"],
  volumeCounter: ["flow"],
  power: ["heatingCounter", "coolingCounter"],
  heatingCounter: ["power"],
  coolingCounter: ["power"],
};

/**
 * Gives a column a meaning. Whoever held that meaning is skipped from now on, since a file has one
 * column of each; a unit that does not fit is dropped, and only a sole unit is filled in.
 */
export function withMeaning(recipe: FileRecipe, index: number, meaning: ColumnMeaning): FileRecipe {
  const units = unitsOfMeaning(meaning);
  return edit(recipe, (column) => {
    if (column.index === index) {
      const { capacity, ...rest } = column;
      const kept = units.find((unit) => unit === column.unit) ?? null;
      const unit = kept ?? (units.length === 1 ? (units[0] ?? null) : null);
      const counts = isCounter(meaning) && capacity !== undefined;
      return { ...rest, meaning, unit, ...(counts ? { capacity } : {}) };
    }
    const taken =
      (meaning !== "skip" && column.meaning === meaning) ||
      RIVALS[meaning]?.includes(column.meaning);
    const clash =
      (meaning === "time" && isTime(column.meaning)) ||
      (isTime(meaning) && column.meaning === "time");
    return taken || clash ? { ...column, meaning: "skip", unit: null } : column;
  });
}

export function withUnit(recipe: FileRecipe, index: number, unit: ColumnUnit): FileRecipe {
  return edit(recipe, (column) => (column.index === index ? { ...column, unit } : column));
}

/** Where a counter starts from zero again, in the column's unit. */
export function withCapacity(
  recipe: FileRecipe,
  index: number,
  capacity: number | null,
): FileRecipe {
  return edit(recipe, (column) => (column.index === index ? { ...column, capacity } : column));
}

const noMeter = { positivePower: null, exchangedAt: [] } as const;

export function withPositivePower(recipe: FileRecipe, positivePower: PositivePower): FileRecipe {
  return { ...recipe, meter: { ...(recipe.meter ?? noMeter), positivePower } };
}

/** Instants as ISO 8601 in UTC. */
export function withExchanges(recipe: FileRecipe, exchangedAt: readonly string[]): FileRecipe {
  return { ...recipe, meter: { ...(recipe.meter ?? noMeter), exchangedAt } };
}

/** A kind that somebody chose holds, whatever the header says. */
export function withKind(recipe: FileRecipe, seriesKind: SeriesKind): FileRecipe {
  return { ...recipe, seriesKind, kindChosen: true };
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
