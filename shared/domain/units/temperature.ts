import type { TemperatureUnit } from "../log-files/recipe";

/**
 * Temperature. Stored as °C. 0 °C is 273.15 K and 32 °F exactly; a difference of 1 K is 1.8 °F.
 * Example: 44 °F = 6.666667 °C.
 */
export const KELVIN_AT_0_C = 273.15;

/** `value` in `unit` as °C. NaN stays NaN. */
export function toCelsius(value: number, unit: TemperatureUnit): number {
  if (unit === "degC") return value;
  if (unit === "degF") return (value - 32) / 1.8;
  return value - KELVIN_AT_0_C;
}

/** `temperatureC` in `unit`. */
export function fromCelsius(temperatureC: number, unit: TemperatureUnit): number {
  if (unit === "degC") return temperatureC;
  if (unit === "degF") return temperatureC * 1.8 + 32;
  return temperatureC + KELVIN_AT_0_C;
}

/** A difference in `unit` as K: no offset, only the size of the degree. */
export function differenceToKelvin(value: number, unit: TemperatureUnit): number {
  return unit === "degF" ? value / 1.8 : value;
}

/** A difference in K as degrees of `unit`. */
export function differenceFromKelvin(differenceK: number, unit: TemperatureUnit): number {
  return unit === "degF" ? differenceK * 1.8 : differenceK;
}

/** Converts a whole column to °C in place and returns it. NaN stays NaN. */
export function columnToCelsius(column: Float64Array, unit: TemperatureUnit): Float64Array {
  if (unit === "degF") {
    for (let i = 0; i < column.length; i++) column[i] = (column[i]! - 32) / 1.8;
  } else if (unit === "K") {
    for (let i = 0; i < column.length; i++) column[i] = column[i]! - KELVIN_AT_0_C;
  }
  return column;
}
