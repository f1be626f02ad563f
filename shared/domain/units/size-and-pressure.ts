import { LITRES_PER_US_GALLON } from "./flow";

/**
 * Length, speed, area, volume and pressure, all exact by definition: inch 25.4 mm, foot 0.3048 m,
 * pound-force 4.4482216152605 N (NIST SP 811, appendix B.8). Stored as mm, m/s, m², m³ and MPa.
 */
export type LengthUnit = "mm" | "in" | "m" | "ft";
export type SpeedUnit = "m/s" | "ft/s";
export type AreaUnit = "m2" | "ft2";
export type VolumeUnit = "m3" | "L" | "US gal" | "ft3";
export type PressureUnit = "MPa" | "bar" | "kPa" | "psi";

export const MM_PER: Readonly<Record<LengthUnit, number>> = { mm: 1, in: 25.4, m: 1000, ft: 304.8 };
export const M_PER_S_PER: Readonly<Record<SpeedUnit, number>> = { "m/s": 1, "ft/s": 0.3048 };
export const M2_PER: Readonly<Record<AreaUnit, number>> = { m2: 1, ft2: 0.3048 * 0.3048 };
export const M3_PER: Readonly<Record<VolumeUnit, number>> = {
  m3: 1,
  L: 0.001,
  "US gal": LITRES_PER_US_GALLON / 1000,
  ft3: 0.3048 ** 3,
};
export const MPA_PER: Readonly<Record<PressureUnit, number>> = {
  MPa: 1,
  bar: 0.1,
  kPa: 0.001,
  psi: 4.4482216152605 / (25.4 * 25.4),
};

export function toMm(value: number, unit: LengthUnit): number {
  return value * MM_PER[unit];
}

export function fromMm(lengthMm: number, unit: LengthUnit): number {
  return lengthMm / MM_PER[unit];
}

export function toMetresPerSecond(value: number, unit: SpeedUnit): number {
  return value * M_PER_S_PER[unit];
}

export function fromMetresPerSecond(speedMPerS: number, unit: SpeedUnit): number {
  return speedMPerS / M_PER_S_PER[unit];
}

export function toM3(value: number, unit: VolumeUnit): number {
  return value * M3_PER[unit];
}

export function fromM3(volumeM3: number, unit: VolumeUnit): number {
  return volumeM3 / M3_PER[unit];
}

export function toMPa(value: number, unit: PressureUnit): number {
  return value * MPA_PER[unit];
}

export function fromMPa(pressureMPa: number, unit: PressureUnit): number {
  return pressureMPa / MPA_PER[unit];
}
