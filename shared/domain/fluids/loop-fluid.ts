import type { FluidProblem } from "./fluid-problem";
import { HIGHEST_PRESSURE_MPA, LOWEST_PRESSURE_MPA, waterProblem } from "./water";
import type { FluidAtPressure } from "./fluid-at-pressure";
import { waterAtPressure } from "./water-at-pressure";

/** What fills a loop. */
export type LoopFluid =
  | { readonly kind: "water" }
  | {
      readonly kind: "ethyleneGlycol" | "propyleneGlycol";
      readonly percent: number;
      readonly basis: "mass" | "volume";
    };

export const STANDARD_ATMOSPHERE_MPA = 0.101325;
/** Used, and shown as assumed, where nobody has read the loop's gauge. */
export const ASSUMED_PRESSURE_MPA = 1.6;

export interface LoopPressure {
  /** Absolute. */
  readonly pressureMPa: number;
  readonly assumed: boolean;
}

/** Absolute pressure of a loop from its gauge pressure: gauge + 0.101325 MPa; blank means 1.6 MPa. */
export function absolutePressureMPa(gaugeMPa: number | null): LoopPressure {
  return gaugeMPa === null
    ? { pressureMPa: ASSUMED_PRESSURE_MPA, assumed: true }
    : { pressureMPa: gaugeMPa + STANDARD_ATMOSPHERE_MPA, assumed: false };
}

export type FluidForEnergy =
  | { readonly ok: true; readonly fluid: FluidAtPressure; readonly pressure: LoopPressure }
  | { readonly ok: false; readonly problem: FluidProblem };

/**
 * What the energy of a loop is worked out with, or why there is none. A glycol mixture carries less
 * heat than water (6 to 9 % at 30 % by mass), so it is refused rather than read as water.
 */
export function fluidForEnergy(fluid: LoopFluid, gaugeMPa: number | null): FluidForEnergy {
  if (fluid.kind !== "water") {
    return {
      ok: false,
      problem: {
        code: "concentrationOutOfRange",
        place: "concentration",
        value: fluid.percent,
        message: "Energy is not computed for glycol; the readings are kept as they are.",
        remedy:
          "If the loop holds plain water, change its fluid. Water properties would read high.",
      },
    };
  }
  const pressure = absolutePressureMPa(gaugeMPa);
  const inRange =
    pressure.pressureMPa >= LOWEST_PRESSURE_MPA && pressure.pressureMPa <= HIGHEST_PRESSURE_MPA;
  const problem = inRange ? null : waterProblem(20, pressure.pressureMPa);
  return problem
    ? { ok: false, problem }
    : { ok: true, fluid: waterAtPressure(pressure.pressureMPa), pressure };
}
