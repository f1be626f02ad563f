import { M3_PER_HOUR_PER } from "../../units/flow";
import { METER_POWER_UNITS } from "../../log-files/column-units";
import type { FlowUnit, MeterPowerUnit, TemperatureUnit } from "../../log-files/recipe";

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

export function isMeterPowerUnit(unit: string): unit is MeterPowerUnit {
  return (METER_POWER_UNITS as readonly string[]).includes(unit);
}

/** Whether numbers of a channel can be in such a unit. */
export function isUnitOf(channel: UnitChannel, unit: string): boolean {
  if (channel === "flow") return isFlowUnit(unit);
  return channel === "power" ? isMeterPowerUnit(unit) : isTemperatureUnit(unit);
}
