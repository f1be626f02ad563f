import { columnMeaning } from "@shared/contracts/log-recipe";
import { isCounter, unitsOfMeaning } from "@shared/domain/log-files/column-units";
import type { PositivePower } from "@shared/domain/readings/orient-power";
import type { SeriesKind } from "@shared/domain/readings/reading-columns";
import type { PointSet } from "@shared/domain/log-files/recognition";
import type {
  ClockReading,
  ColumnMeaning,
  ColumnRecipe,
  ColumnUnit,
  DateOrder,
  DecimalMark,
  FileRecipe,
  LoggerClock,
} from "@shared/domain/log-files/recipe";

export const COLUMN_MEANINGS: readonly ColumnMeaning[] = columnMeaning.options;

export const isTime = (meaning: ColumnMeaning): boolean =>
  meaning === "time" || meaning === "date" || meaning === "timeOfDay";

function edit(recipe: FileRecipe, change: (column: ColumnRecipe) => ColumnRecipe): FileRecipe {
  return { ...recipe, columns: recipe.columns.map(change) };
}

/** What a file may hold only one of: ways to say how much water moved, power or counters of the heat. */
const RIVALS: Partial<Record<ColumnMeaning, readonly ColumnMeaning[]>> = {
  flow: ["volumeCounter", "velocity", "pulses"],
  volumeCounter: ["flow", "velocity", "pulses"],
  velocity: ["flow", "volumeCounter", "pulses"],
  pulses: ["flow", "volumeCounter", "velocity"],
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
  // Pulses are counted over a step: to its end, unless somebody says otherwise.
  const counts = meaning === "pulses" && recipe.seriesKind === "instantaneous";
  const kind: SeriesKind = counts ? "meanToLabel" : recipe.seriesKind;
  return edit({ ...recipe, seriesKind: kind }, (column) => {
    if (column.index === index && column.meaning === meaning) return column;
    if (column.index === index) {
      const { capacity, pulseValue: _, badWords: __, ...rest } = column;
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
    return taken || clash ? skipped(column) : column;
  });
}

/** A skipped column keeps nothing that only its meaning had. */
function skipped({ index, header, decimalMark }: ColumnRecipe): ColumnRecipe {
  return { index, header, decimalMark, meaning: "skip", unit: null };
}

/** What one pulse stands for. */
export function withPulseWorth(
  recipe: FileRecipe,
  index: number,
  worth: { readonly pulseValue: number; readonly unit: ColumnUnit },
): FileRecipe {
  return edit(recipe, (column) => (column.index === index ? { ...column, ...worth } : column));
}

/** Which words of a status column mean a bad reading; none is an answer, null asks again. */
export function withBadWords(
  recipe: FileRecipe,
  index: number,
  badWords: readonly string[] | null,
): FileRecipe {
  return edit(recipe, (column) => {
    if (column.index !== index) return column;
    const { badWords: _, ...rest } = column;
    return badWords === null ? rest : { ...rest, badWords };
  });
}

/** Reads the columns of one of several metering points. */
export function withSet(recipe: FileRecipe, set: PointSet): FileRecipe {
  return edit(recipe, (column) => {
    const given = set.columns.find(({ index }) => index === column.index);
    return given ? { ...column, meaning: given.meaning, unit: given.unit } : column;
  });
}

/** Leaves out all columns that nothing tells apart. */
export function withoutAlike(recipe: FileRecipe): FileRecipe {
  return { ...recipe, alikeChosen: true };
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

/** What clocks showed at start and end; none at all where none is given. */
export function withNotes(recipe: FileRecipe, notes: readonly ClockReading[]): FileRecipe {
  const { notes: _before, ...time } = recipe.time;
  return { ...recipe, time: notes.length === 0 ? time : { ...time, notes } };
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
