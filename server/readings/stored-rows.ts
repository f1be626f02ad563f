import { convertInPlace } from "@shared/domain/log-files/column-units";
import type {
  ColumnUnit,
  CountedEnergyUnit,
  CountedVolumeUnit,
  ElectricPowerUnit,
  FlowUnit,
  LoopPressureUnit,
  MeterPowerUnit,
  OutdoorUnit,
  TemperatureUnit,
} from "@shared/domain/log-files/recipe";
import {
  isFlowUnit,
  isMeterPowerUnit,
  isTemperatureUnit,
  type UnitChannel,
} from "@shared/domain/readings/corrections/unit";
import type { ReadingColumns } from "@shared/domain/readings/reading-columns";

/** One quantity as its logger wrote it: numbers in the logger's own unit, NaN for "no reading". */
export interface StoredChannel<Unit extends string> {
  readonly unit: Unit;
  readonly values: Float64Array;
}

/**
 * Rows as they are stored: the numbers a logger wrote, in the unit it wrote them, with their UTC
 * instants (strictly ascending, whole milliseconds) and one quality code a row. Keeping the
 * original unit keeps the decimals few, so the numbers come back bit for bit.
 */
export interface StoredRows {
  readonly instantMs: Float64Array;
  readonly flow: StoredChannel<FlowUnit> | null;
  readonly supply: StoredChannel<TemperatureUnit> | null;
  readonly return: StoredChannel<TemperatureUnit> | null;
  readonly signal: StoredChannel<"%"> | null;
  /** Of a permanent meter; left out where there is none. */
  readonly power?: StoredChannel<MeterPowerUnit> | null;
  readonly volumeCounter?: StoredChannel<CountedVolumeUnit> | null;
  readonly heatingCounter?: StoredChannel<CountedEnergyUnit> | null;
  readonly coolingCounter?: StoredChannel<CountedEnergyUnit> | null;
  /** Companion series, kept beside the readings. */
  readonly outdoor?: StoredChannel<OutdoorUnit> | null;
  readonly electricPower?: StoredChannel<ElectricPowerUnit> | null;
  readonly pressure?: StoredChannel<LoopPressureUnit> | null;
  readonly quality: Uint8Array;
}

/** Which channels a file holds, as a sum of these; part of a block's key. Never renumber. */
export const ChannelBit = {
  flow: 1,
  supply: 2,
  return: 4,
  signal: 8,
  power: 16,
  volumeCounter: 32,
  heatingCounter: 64,
  coolingCounter: 128,
  outdoor: 256,
  electricPower: 512,
  pressure: 1024,
} as const;
export type ChannelName = keyof typeof ChannelBit;

/** Companion series, which say nothing of flow, heat or their coverage. */
export const COMPANION_BITS = ChannelBit.outdoor | ChannelBit.electricPower | ChannelBit.pressure;
/** Everything else: blocks with none of these hold companions alone. */
export const READING_BITS = ChannelBit.outdoor - 1;

/** In the order in which a block holds them. */
export const CHANNEL_NAMES = Object.keys(ChannelBit) as readonly ChannelName[];

export function channelSetOf(rows: StoredRows): number {
  return CHANNEL_NAMES.reduce((set, name) => set + (rows[name] ? ChannelBit[name] : 0), 0);
}

/** The rows in m³/h, °C, percent, kW, m³, kWh and kPa. Their numbers are converted where they lie. */
export function inSiUnits(rows: StoredRows): ReadingColumns {
  const converted = (channel: StoredChannel<ColumnUnit> | null | undefined) =>
    channel ? convertInPlace(channel.values, channel.unit) : null;
  return {
    instantMs: rows.instantMs,
    flowM3PerHour: converted(rows.flow),
    supplyC: converted(rows.supply),
    returnC: converted(rows.return),
    signalPercent: converted(rows.signal),
    ...(rows.power && { powerKw: converted(rows.power) }),
    ...(rows.volumeCounter && { volumeCounterM3: converted(rows.volumeCounter) }),
    ...(rows.heatingCounter && { heatingCounterKwh: converted(rows.heatingCounter) }),
    ...(rows.coolingCounter && { coolingCounterKwh: converted(rows.coolingCounter) }),
    ...(rows.outdoor && { outdoorC: converted(rows.outdoor) }),
    ...(rows.electricPower && { electricKw: converted(rows.electricPower) }),
    ...(rows.pressure && { pressureKpa: converted(rows.pressure) }),
    quality: rows.quality,
  };
}

/** The same numbers read in other units than they were stored with; a unit of no such kind is left. */
export function inUnits(
  rows: StoredRows,
  { flow, supply, return: back, power }: Readonly<Partial<Record<UnitChannel, string>>>,
): StoredRows {
  const asFlow = (channel: StoredRows["flow"]) =>
    channel && flow !== undefined && isFlowUnit(flow) ? { ...channel, unit: flow } : channel;
  const asTemperature = (channel: StoredRows["supply"], unit: string | undefined) =>
    channel && unit !== undefined && isTemperatureUnit(unit) ? { ...channel, unit } : channel;
  return {
    ...rows,
    flow: asFlow(rows.flow),
    supply: asTemperature(rows.supply, supply),
    return: asTemperature(rows.return, back),
    ...(rows.power && power !== undefined && isMeterPowerUnit(power)
      ? { power: { ...rows.power, unit: power } }
      : {}),
  };
}

/** The rows `from` ≤ index < `to`, as views of the same memory. */
export function sliceRows(rows: StoredRows, from: number, to: number): StoredRows {
  const cut = <Unit extends string>(
    channel: StoredChannel<Unit> | null,
  ): StoredChannel<Unit> | null =>
    channel && { unit: channel.unit, values: channel.values.subarray(from, to) };
  return {
    instantMs: rows.instantMs.subarray(from, to),
    flow: cut(rows.flow),
    supply: cut(rows.supply),
    return: cut(rows.return),
    signal: cut(rows.signal),
    ...(rows.power && { power: cut(rows.power) }),
    ...(rows.volumeCounter && { volumeCounter: cut(rows.volumeCounter) }),
    ...(rows.heatingCounter && { heatingCounter: cut(rows.heatingCounter) }),
    ...(rows.coolingCounter && { coolingCounter: cut(rows.coolingCounter) }),
    ...(rows.outdoor && { outdoor: cut(rows.outdoor) }),
    ...(rows.electricPower && { electricPower: cut(rows.electricPower) }),
    ...(rows.pressure && { pressure: cut(rows.pressure) }),
    quality: rows.quality.subarray(from, to),
  };
}
