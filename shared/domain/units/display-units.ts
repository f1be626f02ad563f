import { KW_PER, KWH_PER } from "./energy-and-power";
import { M3_PER_HOUR_PER_US_GPM } from "./flow";
import { M2_PER, M3_PER, M_PER_S_PER, MM_PER, MPA_PER } from "./size-and-pressure";

/**
 * Which unit an account sees for each quantity. Stored values never change: what is shown is
 * `stored × factor + offset`, what is typed becomes `(typed − offset) ÷ factor`.
 */
export type UnitSystem = "si" | "inchPound";

export type Quantity =
  | "flow"
  | "velocity"
  | "temperature"
  | "temperatureDifference"
  | "heatingPower"
  | "coolingPower"
  | "heatingEnergy"
  | "coolingEnergy"
  | "volume"
  | "pipeSize"
  | "distance"
  | "floorArea"
  | "pressure"
  | "volumePerEnergy";

export interface DisplayUnit {
  /** As written beside the value. */
  readonly unit: string;
  /** Unit of the stored value. */
  readonly storedUnit: string;
  readonly factor: number;
  readonly offset: number;
}

function shown(unit: string, storedUnit: string, factor = 1, offset = 0): DisplayUnit {
  return { unit, storedUnit, factor, offset };
}

const SI: Readonly<Record<Quantity, DisplayUnit>> = {
  flow: shown("m³/h", "m³/h"),
  velocity: shown("m/s", "m/s"),
  temperature: shown("°C", "°C"),
  temperatureDifference: shown("K", "K"),
  heatingPower: shown("kW", "kW"),
  coolingPower: shown("kW", "kW"),
  heatingEnergy: shown("kWh", "kWh"),
  coolingEnergy: shown("kWh", "kWh"),
  volume: shown("m³", "m³"),
  pipeSize: shown("mm", "mm"),
  distance: shown("m", "m"),
  floorArea: shown("m²", "m²"),
  pressure: shown("bar", "MPa", 1 / MPA_PER.bar),
  volumePerEnergy: shown("L/kWh", "m³/kWh", 1000),
};

/** Cooling is counted in tons and ton-hours, heating in thousands of Btu, as the trade does. */
const INCH_POUND: Readonly<Record<Quantity, DisplayUnit>> = {
  flow: shown("US gpm", "m³/h", 1 / M3_PER_HOUR_PER_US_GPM),
  velocity: shown("ft/s", "m/s", 1 / M_PER_S_PER["ft/s"]),
  temperature: shown("°F", "°C", 1.8, 32),
  temperatureDifference: shown("°F", "K", 1.8),
  heatingPower: shown("MBH", "kW", 1 / KW_PER.MBH),
  coolingPower: shown("ton", "kW", 1 / KW_PER.ton),
  heatingEnergy: shown("kBtu", "kWh", 1 / KWH_PER.kBtu),
  coolingEnergy: shown("ton-h", "kWh", 1 / KWH_PER["ton-h"]),
  volume: shown("US gal", "m³", 1 / M3_PER["US gal"]),
  pipeSize: shown("in", "mm", 1 / MM_PER.in),
  distance: shown("ft", "m", 1000 / MM_PER.ft),
  floorArea: shown("ft²", "m²", 1 / M2_PER.ft2),
  pressure: shown("psi", "MPa", 1 / MPA_PER.psi),
  volumePerEnergy: shown("gal/ton-h", "m³/kWh", KWH_PER["ton-h"] / M3_PER["US gal"]),
};

export function displayUnits(system: UnitSystem): Readonly<Record<Quantity, DisplayUnit>> {
  return system === "si" ? SI : INCH_POUND;
}

/** A stored value as shown. */
export function toDisplay(stored: number, unit: DisplayUnit): number {
  return stored * unit.factor + unit.offset;
}

/** A typed value as stored. */
export function fromDisplay(typed: number, unit: DisplayUnit): number {
  return (typed - unit.offset) / unit.factor;
}
