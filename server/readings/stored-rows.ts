import type { FlowUnit, TemperatureUnit } from "@shared/domain/log-files/recipe";
import type { ReadingColumns } from "@shared/domain/readings/reading-columns";
import { columnToM3PerHour } from "@shared/domain/units/flow";
import { columnToCelsius } from "@shared/domain/units/temperature";

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
  readonly quality: Uint8Array;
}

/** Which channels a file holds, as a sum of these; part of a block's key. Never renumber. */
export const ChannelBit = { flow: 1, supply: 2, return: 4, signal: 8 } as const;

export function channelSetOf(rows: StoredRows): number {
  return (
    (rows.flow ? ChannelBit.flow : 0) +
    (rows.supply ? ChannelBit.supply : 0) +
    (rows.return ? ChannelBit.return : 0) +
    (rows.signal ? ChannelBit.signal : 0)
  );
}

/** The rows in m³/h, °C and percent. Their numbers are converted where they lie. */
export function inSiUnits(rows: StoredRows): ReadingColumns {
  return {
    instantMs: rows.instantMs,
    flowM3PerHour: rows.flow && columnToM3PerHour(rows.flow.values, rows.flow.unit),
    supplyC: rows.supply && columnToCelsius(rows.supply.values, rows.supply.unit),
    returnC: rows.return && columnToCelsius(rows.return.values, rows.return.unit),
    signalPercent: rows.signal && rows.signal.values,
    quality: rows.quality,
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
    quality: rows.quality.subarray(from, to),
  };
}
