/**
 * Readings of one metering point as parallel columns.
 *
 * A column is a `Float64Array`, one entry a row; `NaN` stands for "no reading" (the one place where
 * unknown is not `null`, because typed arrays cannot hold it). Instants are UTC milliseconds since
 * 1970, strictly ascending. Units are fixed: m³/h, °C, percent.
 */
export interface ReadingColumns {
  readonly instantMs: Float64Array;
  readonly flowM3PerHour: Float64Array | null;
  readonly supplyC: Float64Array | null;
  readonly returnC: Float64Array | null;
  /** Signal strength in percent where the logger wrote one. */
  readonly signalPercent: Float64Array | null;
  /** One {@link RowQuality} code a row. */
  readonly quality: Uint8Array;
}

/** What a row is worth. The code is stored; never renumber. */
export const RowQuality = {
  /** As read. */
  measured: 0,
  /** Left out by somebody's choice; the value stays readable and never counts as energy. */
  excluded: 1,
  /** The logger wrote that it had no reading (a sentinel or an empty cell) in a channel energy needs. */
  noReading: 2,
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
}
