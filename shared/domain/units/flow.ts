import type { FlowUnit } from "../log-files/recipe";

/**
 * Volume flow. Stored as m³/h; every factor below is exact by definition.
 *
 * The US gallon is 231 cubic inches and the inch is 25.4 mm (NIST SP 811, appendix B.8), so
 * 1 gal = 3.785411784 L and 1 gpm = 0.22712470704 m³/h. Example: 100 US gpm = 22.712470704 m³/h.
 */
export const LITRES_PER_US_GALLON = 3.785411784;
export const M3_PER_HOUR_PER_US_GPM = (LITRES_PER_US_GALLON * 60) / 1000;

export const M3_PER_HOUR_PER: Readonly<Record<FlowUnit, number>> = {
  "m3/h": 1,
  "L/s": 3.6,
  "L/min": 0.06,
  "US gpm": M3_PER_HOUR_PER_US_GPM,
  "L/h": 0.001,
};

/** `value` in `unit` as m³/h. NaN stays NaN. */
export function toM3PerHour(value: number, unit: FlowUnit): number {
  return value * M3_PER_HOUR_PER[unit];
}

/** `flowM3PerHour` in `unit`. */
export function fromM3PerHour(flowM3PerHour: number, unit: FlowUnit): number {
  return flowM3PerHour / M3_PER_HOUR_PER[unit];
}

/** Converts a whole column to m³/h in place and returns it. NaN stays NaN. */
export function columnToM3PerHour(column: Float64Array, unit: FlowUnit): Float64Array {
  const factor = M3_PER_HOUR_PER[unit];
  if (factor !== 1) for (let i = 0; i < column.length; i++) column[i] = column[i]! * factor;
  return column;
}
