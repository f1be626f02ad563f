import type { LoopService } from "../energy/power";
import { toM3PerHour } from "../units/flow";
import { toCelsius } from "../units/temperature";
import type { ColumnRecipe, FlowUnit, TemperatureUnit } from "./recipe";
import type { SampleRow } from "./recognition";
import { sampleNumber } from "./sample-number";

/**
 * Temperatures a loop of each service can have, °C, wide enough for glycol, for a chilled loop that
 * stands in a warm plant room and for pressurised hot water. Beyond them the unit is in doubt.
 */
const POSSIBLE_C: Readonly<Record<LoopService, readonly [number, number]>> = {
  cooling: [-10, 45],
  heating: [1, 150],
  changeover: [-10, 150],
};

/** Water runs slower in any pipe of a loop; common practice. */
const FASTEST_M_PER_S = 5;

/**
 * The first shown reading that water in this loop and pipe cannot have if the column's unit is right.
 * Null where half of the readings can, since a few may be words for "no reading" written as numbers,
 * or where nothing is known to hold them against.
 */
export function implausibleValue(
  column: ColumnRecipe,
  place: {
    readonly sampleRows: readonly SampleRow[];
    readonly service: LoopService | null;
    readonly insideDiameterMm: number | null;
  },
): { readonly line: number; readonly cell: string } | null {
  const isPossible = judge(column, place);
  if (isPossible === null) return null;
  let possible = 0;
  const odd: { line: number; cell: string }[] = [];
  for (const { line, cells } of place.sampleRows) {
    const cell = cells[column.index] ?? "";
    const value = sampleNumber(cell, column.decimalMark);
    if (value === null) continue;
    if (isPossible(value)) possible++;
    else odd.push({ line, cell });
  }
  return odd.length > possible ? (odd[0] ?? null) : null;
}

function judge(
  { meaning, unit }: ColumnRecipe,
  place: { readonly service: LoopService | null; readonly insideDiameterMm: number | null },
): ((value: number) => boolean) | null {
  if (unit === null) return null;
  if (meaning === "supply" || meaning === "return") {
    const [lowest, highest] = POSSIBLE_C[place.service ?? "changeover"];
    return (value) => {
      const celsius = toCelsius(value, unit as TemperatureUnit);
      return celsius >= lowest && celsius <= highest;
    };
  }
  if (meaning === "flow" && place.insideDiameterMm !== null) {
    const areaM2 = (Math.PI / 4) * (place.insideDiameterMm / 1000) ** 2;
    return (value) =>
      Math.abs(toM3PerHour(value, unit as FlowUnit)) / 3600 / areaM2 <= FASTEST_M_PER_S;
  }
  return null;
}
