import { KW_PER, KWH_PER } from "../units/energy-and-power";
import { M3_PER_HOUR_PER } from "../units/flow";
import { M3_PER, M_PER_S_PER, MPA_PER } from "../units/size-and-pressure";
import { columnToCelsius } from "../units/temperature";
import type { ChannelMeaning } from "./raw-rows";
import type {
  ColumnMeaning,
  ColumnUnit,
  CountedEnergyUnit,
  CountedVolumeUnit,
  ElectricPowerUnit,
  FlowUnit,
  LoopPressureUnit,
  MeterPowerUnit,
  OutdoorUnit,
  TemperatureUnit,
  VelocityUnit,
} from "./recipe";

export const FLOW_UNITS: readonly FlowUnit[] = ["m3/h", "L/s", "L/min", "US gpm", "L/h"];
export const VELOCITY_UNITS: readonly VelocityUnit[] = ["m/s", "ft/s"];
export const TEMPERATURE_UNITS: readonly TemperatureUnit[] = ["degC", "degF", "K"];
export const METER_POWER_UNITS: readonly MeterPowerUnit[] = ["kW", "MW", "W", "MBH", "ton"];
export const COUNTED_VOLUME_UNITS: readonly CountedVolumeUnit[] = ["m3", "L", "US gal", "ft3"];
export const COUNTED_ENERGY_UNITS: readonly CountedEnergyUnit[] = [
  "kWh",
  "MWh",
  "MJ",
  "GJ",
  "kBtu",
  "MMBtu",
];

export const OUTDOOR_UNITS: readonly OutdoorUnit[] = ["degC", "degF"];
export const ELECTRIC_POWER_UNITS: readonly ElectricPowerUnit[] = ["kW", "W"];
export const PRESSURE_UNITS: readonly LoopPressureUnit[] = ["kPa", "bar", "psi"];

const UNITS_OF: Readonly<Record<ChannelMeaning, readonly ColumnUnit[]>> = {
  flow: FLOW_UNITS,
  supply: TEMPERATURE_UNITS,
  return: TEMPERATURE_UNITS,
  signal: ["%"],
  power: METER_POWER_UNITS,
  volumeCounter: COUNTED_VOLUME_UNITS,
  heatingCounter: COUNTED_ENERGY_UNITS,
  coolingCounter: COUNTED_ENERGY_UNITS,
  velocity: VELOCITY_UNITS,
  // Of volume, for one pulse.
  pulses: COUNTED_VOLUME_UNITS,
  status: [],
  outdoor: OUTDOOR_UNITS,
  electricPower: ELECTRIC_POWER_UNITS,
  pressure: PRESSURE_UNITS,
};

export function isChannelMeaning(meaning: ColumnMeaning): meaning is ChannelMeaning {
  return Object.prototype.hasOwnProperty.call(UNITS_OF, meaning);
}

/** Units a column of this meaning can have; none for times and skipped columns. */
export function unitsOfMeaning(meaning: ColumnMeaning): readonly ColumnUnit[] {
  return isChannelMeaning(meaning) ? UNITS_OF[meaning] : [];
}

/** The unit in which readings of this meaning are worked with; "%" for those that have none. */
export function storedUnitOf(meaning: ChannelMeaning): ColumnUnit {
  return UNITS_OF[meaning][0] ?? "%";
}

/** Meanings whose columns are kept beside the readings and never enter energy. */
export type CompanionMeaning = "outdoor" | "electricPower" | "pressure";

export function isCompanion(meaning: ColumnMeaning): meaning is CompanionMeaning {
  return meaning === "outdoor" || meaning === "electricPower" || meaning === "pressure";
}

/** Whether a column of this meaning must have a unit; signals are percent, words have none. */
export function needsUnit(
  meaning: ColumnMeaning,
): meaning is Exclude<ChannelMeaning, "signal" | "status"> {
  return isChannelMeaning(meaning) && meaning !== "signal" && meaning !== "status";
}

export function isCounter(
  meaning: ColumnMeaning,
): meaning is "volumeCounter" | "heatingCounter" | "coolingCounter" {
  return (
    meaning === "volumeCounter" || meaning === "heatingCounter" || meaning === "coolingCounter"
  );
}

const KW_PER_METER_UNIT: Readonly<Record<MeterPowerUnit, number>> = {
  kW: KW_PER.kW,
  MW: KW_PER.MW,
  W: KW_PER.W,
  MBH: KW_PER.MBH,
  ton: KW_PER.ton,
};

/** How many of the stored unit one of this is; temperatures have no such factor. */
const FACTOR: Readonly<Partial<Record<ColumnUnit, number>>> = {
  ...M3_PER_HOUR_PER,
  ...KW_PER_METER_UNIT,
  m3: M3_PER.m3,
  L: M3_PER.L,
  "US gal": M3_PER["US gal"],
  ft3: M3_PER.ft3,
  kWh: KWH_PER.kWh,
  MWh: KWH_PER.MWh,
  MJ: KWH_PER.MJ,
  GJ: KWH_PER.GJ,
  kBtu: KWH_PER.kBtu,
  MMBtu: KWH_PER.MMBtu,
  "ft/s": M_PER_S_PER["ft/s"],
  bar: MPA_PER.bar / MPA_PER.kPa,
  psi: MPA_PER.psi / MPA_PER.kPa,
};

/** A value of a scale with a true zero (power, volume, energy, flow) in the unit it is worked with. */
export function toStoredScale(value: number, unit: ColumnUnit): number {
  return value * (FACTOR[unit] ?? 1);
}

/** A column in m³/h, °C, percent, kW, m³ or kWh; the column itself where it already is. */
export function columnToStoredUnit(values: Float64Array, unit: ColumnUnit): Float64Array {
  return STORED.has(unit) ? values : convertInPlace(values.slice(), unit);
}

const STORED: ReadonlySet<ColumnUnit> = new Set(
  Object.values(UNITS_OF).flatMap(([unit]) => unit ?? []),
);

/** Converts a whole column as {@link columnToStoredUnit} does, where it lies. NaN stays NaN. */
export function convertInPlace(values: Float64Array, unit: ColumnUnit): Float64Array {
  if (unit === "degF" || unit === "K") return columnToCelsius(values, unit);
  const factor = FACTOR[unit] ?? 1;
  if (factor !== 1) for (let i = 0; i < values.length; i++) values[i] = values[i]! * factor;
  return values;
}
