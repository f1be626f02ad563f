import { ASHRAE_GLYCOL, type GlycolKind } from "./glycol-ashrae";
import { polynomial } from "./glycol-correlation";

export type ConcentrationBasis = "mass" | "volume";

export interface GlycolConcentration {
  readonly volumePercent: number;
  readonly massPercent: number;
}

/** Highest mass fraction for which the conversion is known, and a little more to search in. */
const HIGHEST_MASS_FRACTION = 0.65;

/**
 * Volume fraction of a mass fraction by the ASHRAE tables. The fit misses 0 by 0.009 percentage
 * points; below 10 % by mass that miss is taken out in proportion, so that water stays water.
 */
function volumeOfMass(kind: GlycolKind, mass: number): number {
  const { xbase, mass_to_volume_fraction: fit } = ASHRAE_GLYCOL[kind];
  const atZero = polynomial(fit, -xbase);
  return polynomial(fit, mass - xbase) - atZero * Math.max(0, 1 - mass / 0.1);
}

/** Percent by volume from percent by mass, 0 to 62 %. Example: 30 % ethylene glycol → 27.705 %. */
export function volumeFromMassPercent(kind: GlycolKind, massPercent: number): number {
  return 100 * volumeOfMass(kind, massPercent / 100);
}

/** The inverse of {@link volumeFromMassPercent}, by bisection: 27.705 % ethylene glycol → 30 %. */
export function massFromVolumePercent(kind: GlycolKind, volumePercent: number): number {
  const volume = volumePercent / 100;
  let low = 0;
  let high = HIGHEST_MASS_FRACTION;
  // 50 halvings leave less than the last bit of a percentage anybody enters.
  for (let i = 0; i < 50; i++) {
    const middle = (low + high) / 2;
    if (volumeOfMass(kind, middle) < volume) low = middle;
    else high = middle;
  }
  return 50 * (low + high);
}

/**
 * One concentration on both bases, percent as entered on its own; null where it is not a number from
 * 0 to 60 % by volume, the range of the ASHRAE tables and what lies between them and water.
 */
export function glycolConcentration(
  kind: GlycolKind,
  percent: number,
  basis: ConcentrationBasis,
): GlycolConcentration | null {
  if (!(percent >= 0 && percent <= 100 * HIGHEST_MASS_FRACTION)) return null;
  const volumePercent = basis === "volume" ? percent : volumeFromMassPercent(kind, percent);
  if (volumePercent > 60) return null;
  const massPercent = basis === "mass" ? percent : massFromVolumePercent(kind, percent);
  return { volumePercent, massPercent };
}
