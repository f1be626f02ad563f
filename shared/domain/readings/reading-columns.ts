import type { FluidSpan } from "./corrections/fluid-span";

/**
 * Readings of one metering point as parallel columns.
 *
 * A column is a `Float64Array`, one entry a row; `NaN` stands for "no reading" (the one place where
 * unknown is not `null`, because typed arrays cannot hold it). Instants are UTC milliseconds since
 * 1970, strictly ascending. Units are fixed: m³/h, °C, percent, kW; counters in m³ and kWh.
 */
export interface ReadingColumns {
  readonly instantMs: Float64Array;
  readonly flowM3PerHour: Float64Array | null;
  readonly supplyC: Float64Array | null;
  readonly returnC: Float64Array | null;
  /** Signal strength in percent where the logger wrote one. */
  readonly signalPercent: Float64Array | null;
  /** Heat power of a permanent meter, heating positive once segments are resolved. */
  readonly powerKw?: Float64Array | null;
  /** Mean powers from the counters of a permanent meter, each ≥ 0, over the step ending at the label. */
  readonly heatingKw?: Float64Array | null;
  readonly coolingKw?: Float64Array | null;
  /** Counters as read. Resolving turns them into flow and power: see `counter-steps`. */
  readonly volumeCounterM3?: Float64Array | null;
  readonly heatingCounterKwh?: Float64Array | null;
  readonly coolingCounterKwh?: Float64Array | null;
  /** Companion series of one file: kept beside the readings. Resolving drops them, so none enters energy. */
  readonly outdoorC?: Float64Array | null;
  readonly electricKw?: Float64Array | null;
  readonly pressureKpa?: Float64Array | null;
  /** One {@link RowQuality} code a row. */
  readonly quality: Uint8Array;
}

export const READING_CHANNELS = [
  "flowM3PerHour",
  "supplyC",
  "returnC",
  "signalPercent",
  "powerKw",
  "heatingKw",
  "coolingKw",
  "volumeCounterM3",
  "heatingCounterKwh",
  "coolingCounterKwh",
] as const;
export type ReadingChannel = (typeof READING_CHANNELS)[number];
export const COUNTER_CHANNELS = [
  "volumeCounterM3",
  "heatingCounterKwh",
  "coolingCounterKwh",
] as const satisfies readonly ReadingChannel[];

export const COMPANION_CHANNELS = ["outdoorC", "electricKw", "pressureKpa"] as const;
export type CompanionChannel = (typeof COMPANION_CHANNELS)[number];

/** Each channel that is there through `change`; the others stay as they are. */
export function mapChannels(
  columns: ReadingColumns,
  change: (values: Float64Array, channel: ReadingChannel | CompanionChannel) => Float64Array,
): Pick<ReadingColumns, ReadingChannel | CompanionChannel> {
  const changed: Partial<Record<ReadingChannel | CompanionChannel, Float64Array>> = {};
  for (const channel of [...READING_CHANNELS, ...COMPANION_CHANNELS]) {
    const values = columns[channel];
    if (values) changed[channel] = change(values, channel);
  }
  return { flowM3PerHour: null, supplyC: null, returnC: null, signalPercent: null, ...changed };
}

/** What a row is worth. The code is stored; never renumber. */
export const RowQuality = {
  /** As read. */
  measured: 0,
  /** Left out by somebody's choice; the value stays readable and never counts as energy. */
  excluded: 1,
  /** The logger wrote that it had no reading (a sentinel or an empty cell) in a channel energy needs. */
  noReading: 2,
  /** A counter's reading that opens a step: read, and speaking for no time. Made, never stored. */
  opening: 3,
} as const;
export type RowQualityCode = (typeof RowQuality)[keyof typeof RowQuality];

/**
 * How a row relates to time.
 * `instantaneous`: the value at the instant. `meanFromLabel`: the mean over the step that starts at
 * the label. `meanToLabel`: the mean over the step that ends at the label.
 */
export type SeriesKind = "instantaneous" | "meanFromLabel" | "meanToLabel";

/** A run of rows of one kind and one nominal step, ready to integrate; segments never overlap. */
export interface ReadingSegment {
  readonly kind: SeriesKind;
  readonly nominalStepMs: number;
  readonly columns: ReadingColumns;
  /** Stretches in which another fluid than the loop's filled it; left out where there are none. */
  readonly fluids?: readonly FluidSpan[];
  /** Somebody parted it from the segment before: nothing is joined or averaged across. */
  readonly startsAnew?: boolean;
}
