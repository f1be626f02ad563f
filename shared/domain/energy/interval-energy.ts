/**
 * Energy summed into equal UTC intervals, as parallel columns: what the database stores a row for.
 *
 * Registers are both ≥ 0 and never netted. Integrals are what makes every mean reproducible:
 * flow-weighted ΔT = Σ flowDeltaT / Σ volume, energy-weighted ΔT = Σ powerDeltaT / Σ energy,
 * time mean ΔT = Σ deltaT / Σ running seconds. Heating ΔT is supply − return, cooling is return − supply.
 */

/** Length of a stored interval. Every zone in use today starts its days on a quarter hour. */
export const INTERVAL_MS = 900_000;

/** Bumped when the same readings would give another figure; stored with every interval. */
export const ENGINE_VERSION = 1;

export interface RegisterColumns {
  readonly energyKwh: Float64Array;
  readonly volumeM3: Float64Array;
  /** ∫ q·Δθ dt in m³·K. */
  readonly flowDeltaTM3K: Float64Array;
  /** ∫ P·Δθ dt in kWh·K. */
  readonly powerDeltaTKwhK: Float64Array;
  /** ∫ Δθ dt in K·s over the time this register ran. */
  readonly deltaTKs: Float64Array;
  /** Seconds this register ran: what `deltaTKs` is divided by. */
  readonly runningS: Float64Array;
}

export interface IntervalEnergyColumns {
  /** Start of each interval, UTC ms, ascending, a multiple of INTERVAL_MS; intervals without any row are absent. */
  readonly startMs: Float64Array;
  /** Seconds of the interval that readings cover, 0…900. */
  readonly coveredS: Float64Array;
  readonly heating: RegisterColumns;
  readonly cooling: RegisterColumns;
  /** Volume over all covered time, whatever the register, m³. */
  readonly volumeM3: Float64Array;
  /** Energy that a cut-off kept out of both registers, as |P|·dt, and for how long. */
  readonly suppressedKwh: Float64Array;
  readonly suppressedS: Float64Array;
  /** Extremes of signed power (heating positive) and of flow; NaN where nothing is covered. */
  readonly minPowerKw: Float64Array;
  readonly maxPowerKw: Float64Array;
  readonly minFlowM3PerHour: Float64Array;
  readonly maxFlowM3PerHour: Float64Array;
  /** ∫ θ dt in °C·s; divide by coveredS − meterOnlyS for the mean. */
  readonly supplyCs: Float64Array;
  readonly returnCs: Float64Array;
  /** Rows whose instant falls in the interval, by quality. */
  readonly measuredRows: Float64Array;
  readonly excludedRows: Float64Array;
  readonly noReadingRows: Float64Array;
  /** 1 where a step was split in proportion at a boundary of this interval. */
  readonly apportioned: Uint8Array;
  /** Seconds of the covered time that only a permanent meter's power speaks for: no volume, no ΔT. */
  readonly meterOnlyS: Float64Array;
  /** Rows of a meter's power against the register of the loop's service. */
  readonly againstRows: Float64Array;
}
