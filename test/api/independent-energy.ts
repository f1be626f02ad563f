import { IAPWS97_EoS } from "@neutrium/thermo.eos.iapws97";

/** Readings of one channel as they were put into a file; NaN where the logger had none. */
export interface Series {
  readonly instantMs: ArrayLike<number>;
  readonly values: ArrayLike<number>;
}

/** A loop's readings in m³/h and °C. */
export interface LoopReadings {
  readonly flow: Series;
  readonly flowStepMs: number;
  readonly supply: Series;
  readonly return: Series;
  readonly temperatureStepMs: number;
}

const other = new IAPWS97_EoS();

function water(temperatureC: number, pressureMPa: number) {
  const { rho, h } = other.solve({ p: pressureMPa * 1e6, t: temperatureC + 273.15 });
  return { densityKgPerM3: Number(rho), enthalpyKjPerKg: Number(h) };
}

/**
 * Value of a series at an instant, straight between the readings round it, where these are at most
 * two steps apart; NaN else. Rows of `skip` are left out, as if they had not been written.
 */
function between(series: Series, skip: (row: number) => boolean, atMs: number, stepMs: number) {
  let before = -1;
  let after = -1;
  for (let row = 0; row < series.instantMs.length; row++) {
    if (skip(row)) continue;
    const at = series.instantMs[row] ?? NaN;
    if (at <= atMs) before = row;
    if (at >= atMs) {
      after = row;
      break;
    }
  }
  if (before < 0 || after < 0) return NaN;
  const from = series.instantMs[before] ?? NaN;
  const to = series.instantMs[after] ?? NaN;
  const start = series.values[before] ?? NaN;
  const end = series.values[after] ?? NaN;
  if (from === to) return start;
  if (to - from > 2 * stepMs) return NaN;
  return start + ((atMs - from) / (to - from)) * (end - start);
}

/**
 * Cooling energy of a chilled loop with its meter on the return, kWh, for a test to hold ours
 * against: nothing here comes from the product. Water by an independent implementation of IF97
 * (@neutrium/thermo.eos.iapws97 2.0.2), power for each reading, trapezoid between neighbours; a
 * reading that is missing, and a step over three nominal ones, count for nothing.
 */
export function independentCoolingKwh(readings: LoopReadings, pressureMPa: number): number {
  const { flow, supply, return: back } = readings;
  const missing = (row: number) =>
    Number.isNaN(supply.values[row] ?? NaN) || Number.isNaN(back.values[row] ?? NaN);
  const powerKw = Array.from({ length: flow.instantMs.length }, (_, row) => {
    const at = flow.instantMs[row] ?? NaN;
    const supplyC = between(supply, missing, at, readings.temperatureStepMs);
    const returnC = between(back, missing, at, readings.temperatureStepMs);
    const flowM3PerHour = flow.values[row] ?? NaN;
    if (Number.isNaN(supplyC + returnC + flowM3PerHour)) return NaN;
    const cold = water(supplyC, pressureMPa);
    const warm = water(returnC, pressureMPa);
    const kgPerS = (flowM3PerHour * warm.densityKgPerM3) / 3600;
    return kgPerS * (warm.enthalpyKjPerKg - cold.enthalpyKjPerKg);
  });
  let kwh = 0;
  for (let row = 1; row < powerKw.length; row++) {
    const hours = ((flow.instantMs[row] ?? NaN) - (flow.instantMs[row - 1] ?? NaN)) / 3_600_000;
    const mean = ((powerKw[row] ?? NaN) + (powerKw[row - 1] ?? NaN)) / 2;
    if (Number.isNaN(mean) || hours > (3 * readings.flowStepMs) / 3_600_000) continue;
    kwh += mean * hours;
  }
  return kwh;
}
