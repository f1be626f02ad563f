import type { EnergySteps } from "../energy/demand";
import { INTERVAL_MS, type IntervalEnergyColumns } from "../energy/interval-energy";

/**
 * The load of one register in equal steps: what peaks, percentiles and curves are taken from.
 *
 * Means are over covered time. A step is a quarter-hour, or as long as the log's own step where that
 * is longer: an hourly log would else count each of its values four times.
 */
export interface LoadSteps extends EnergySteps {
  /** Of everything that flowed, or of one register alone; m³. */
  readonly volumeM3: Float64Array;
  /** Means over covered time, °C; NaN where nothing is covered. */
  readonly supplyC: Float64Array;
  readonly returnC: Float64Array;
}

/** Length of a step for a log of this step: whole quarter-hours, an hour for an hourly log. */
export function loadStepMs(nominalStepMs: number | null): number {
  if (nominalStepMs === null || nominalStepMs <= INTERVAL_MS) return INTERVAL_MS;
  return Math.ceil(nominalStepMs / INTERVAL_MS) * INTERVAL_MS;
}

/**
 * Stored quarter-hours as steps of one register. Longer steps start on multiples of their length by
 * the wall clock. `volume`: "all" counts what flowed whatever the register, "register" only what
 * flowed while this one ran, which is right for a loop with two.
 */
export function loadSteps(
  columns: IntervalEnergyColumns,
  options: {
    readonly register: "heating" | "cooling";
    readonly volume: "all" | "register";
    readonly stepMs: number;
    readonly offsetAt?: (utcMs: number) => number;
  },
): LoadSteps {
  const { stepMs, offsetAt = () => 0 } = options;
  const register = columns[options.register];
  const volume = options.volume === "all" ? columns.volumeM3 : register.volumeM3;
  const starts: number[] = [];
  const place = new Int32Array(columns.startMs.length);
  for (let i = 0; i < columns.startMs.length; i++) {
    const at = columns.startMs[i]!;
    const local = at + offsetAt(at);
    const start = at - (((local % stepMs) + stepMs) % stepMs);
    if (starts.at(-1) !== start) starts.push(start);
    place[i] = starts.length - 1;
  }
  const column = () => new Float64Array(starts.length);
  const steps = {
    stepMs,
    startMs: Float64Array.from(starts),
    coveredS: column(),
    energyKwh: column(),
    volumeM3: column(),
    supplyC: column(),
    returnC: column(),
  };
  for (let i = 0; i < place.length; i++) {
    const at = place[i]!;
    steps.coveredS[at]! += columns.coveredS[i]!;
    steps.energyKwh[at]! += register.energyKwh[i]!;
    steps.volumeM3[at]! += volume[i]!;
    steps.supplyC[at]! += columns.supplyCs[i]!;
    steps.returnC[at]! += columns.returnCs[i]!;
  }
  for (let at = 0; at < starts.length; at++) {
    const seconds = steps.coveredS[at]!;
    steps.supplyC[at] = seconds > 0 ? steps.supplyC[at]! / seconds : NaN;
    steps.returnC[at] = seconds > 0 ? steps.returnC[at]! / seconds : NaN;
  }
  return steps;
}

/** Mean power of a step over its covered time, kW; NaN where nothing is covered. */
export function stepPowerKw({ energyKwh, coveredS }: EnergySteps, i: number): number {
  const seconds = coveredS[i]!;
  return seconds > 0 ? energyKwh[i]! / (seconds / 3600) : NaN;
}
