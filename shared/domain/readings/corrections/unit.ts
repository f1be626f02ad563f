import { M3_PER_HOUR_PER } from "../../units/flow";
import type { FlowUnit, TemperatureUnit } from "../../log-files/recipe";

/**
 * The unit a file's numbers are really in, where its header or somebody's answer named a wrong one.
 * The stored numbers stay; they are only read in another unit, so nothing is converted twice.
 *
 * Example: 28.8 stored as L/s and really m³/h is 28.8 m³/h, not 103.68.
 */
export type UnitChannel = "flow" | "supply" | "return" | "power";

const temperatureUnits: readonly TemperatureUnit[] = ["degC", "degF", "K"];

export function isFlowUnit(unit: string): unit is FlowUnit {
  return Object.hasOwn(M3_PER_HOUR_PER, unit);
}

export function isTemperatureUnit(unit: string): unit is TemperatureUnit {
  return (temperatureUnits as readonly string[]).includes(unit);
}
