import { KW_PER, KWH_PER } from "../units/energy-and-power";
import { M3_PER_HOUR_PER } from "../units/flow";
import { M3_PER } from "../units/size-and-pressure";
import { columnToCelsius } from "../units/temperature";
import type { ChannelMeaning } from "./raw-rows";
import type {
  ColumnMeaning,
  ColumnUnit,
  CountedEnergyUnit,
  CountedVolumeUnit,
  FlowUnit,
  MeterPowerUnit,
  TemperatureUnit,
} from "./recipe";

export const FLOW_UNITS: readonly FlowUnit[] = ["m3/h", "L/s", "L/min", "US gpm"];
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

const UNITS_OF: Readonly<Record<ChannelMeaning, readonly ColumnUnit[]>> = {
  flow: FLOW_UNITS,
  supply: TEMPERATURE_UNITS,
  return: TEMPERATURE_UNITS,
  signal: ["%"],
  power: METER_POWER_UNITS,
  volumeCounter: COUNTED_VOLUME_UNITS,
  heatingCounter: COUNTED_ENERGY_UNITS,
  coolingCounter: COUNTED_ENERGY_UNITS,
};

export function isChannelMeaning(meaning: ColumnMeaning): meaning is ChannelMeaning {
  return Object.prototype.hasOwnProperty.call(UNITS_OF, meaning);
}

/** Units a column of this meaning can have; none for times and skipped columns. */
export function unitsOfMeaning(meaning: ColumnMeaning): readonly ColumnUnit[] {
  return isChannelMeaning(meaning) ? UNITS_OF[meaning] : [];
}

/** The unit in which readings of this meaning are worked with. */
export function storedUnitOf(meaning: ChannelMeaning): ColumnUnit {
  return UNITS_OF[meaning][0] as ColumnUnit;
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
  Object.values(UNITS_OF).map(([unit]) => unit as ColumnUnit),
);

/** Converts a whole column as {@link columnToStoredUnit} does, where it lies. NaN stays NaN. */
export function convertInPlace(values: Float64Array, unit: ColumnUnit): Float64Array {
  if (unit === "degF" || unit === "K") return columnToCelsius(values, unit);
  const factor = FACTOR[unit] ?? 1;
  if (factor !== 1) for (let i = 0; i < values.length; i++) values[i] = values[i]! * factor;
  return values;
}
