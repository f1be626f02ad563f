import data from "../../data/sound_speed_water.json";
import { polynomial } from "./glycol-correlation";
import type { LoopFluid } from "./loop-fluid";

/**
 * Speed of sound in pure water at atmospheric pressure, m/s, c = Σ k·t^i.
 *
 * Marczak, J. Acoust. Soc. Am. 102 (1997) 2776, 0 to 95 °C, is what a meter's display is held
 * against; Bilaniuk and Wong, J. Acoust. Soc. Am. 93 (1993) 1609 with the erratum 99 (1996) 3257, 148
 * points, 0 to 100 °C, is the second opinion. IF97 is up to 3 m/s away and not used for acoustics.
 * Pressure adds about 1.6 m/s for each MPa and is left out, far below the ± 1 % looked for.
 * Example: 20 °C → 1482.380 (Marczak), 1482.358 (Bilaniuk and Wong).
 */
const FORMULAS = {
  marczak1997: data.formulas.marczak1997,
  bilaniukWong1993: data.formulas.bilaniuk_wong_148pt,
} as const;

export type SoundSpeedFormula = keyof typeof FORMULAS;

/** Null outside the formula's own range. */
export function waterSoundSpeedMPerS(
  temperatureC: number,
  formula: SoundSpeedFormula = "marczak1997",
): number | null {
  const { k, range_C } = FORMULAS[formula];
  const [low = NaN, high = NaN] = range_C;
  return temperatureC >= low && temperatureC <= high ? polynomial(k, temperatureC) : null;
}

/** The sound speed to expect in a loop; null for glycol, for which no published formula is at hand. */
export function soundSpeedMPerS(fluid: LoopFluid, temperatureC: number): number | null {
  return fluid.kind === "water" ? waterSoundSpeedMPerS(temperatureC) : null;
}
