import type { FluidAtPressure } from "./fluid-at-pressure";
import type { FluidProblem } from "./fluid-problem";
import type { GlycolKind } from "./glycol-ashrae";
import { glycolAtPressure } from "./glycol-at-pressure";
import { glycolConcentration, type ConcentrationBasis } from "./glycol-concentration";
import { HIGHEST_PRESSURE_MPA, LOWEST_PRESSURE_MPA, waterProblem } from "./water";
import { waterAtPressure } from "./water-at-pressure";

/** What fills a loop. */
export type LoopFluid =
  | { readonly kind: "water" }
  | {
      readonly kind: GlycolKind;
      readonly percent: number;
      readonly basis: ConcentrationBasis;
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
 * What the energy of a loop is worked out with, or why there is none: a pressure nobody computes
 * water at, or a concentration outside the glycol tables. A mixture is never read as water, because
 * it carries less heat (6 to 9 % less at 30 % by mass).
 */
export function fluidForEnergy(fluid: LoopFluid, gaugeMPa: number | null): FluidForEnergy {
  const pressure = absolutePressureMPa(gaugeMPa);
  const inRange =
    pressure.pressureMPa >= LOWEST_PRESSURE_MPA && pressure.pressureMPa <= HIGHEST_PRESSURE_MPA;
  const problem = inRange ? null : waterProblem(20, pressure.pressureMPa);
  if (problem) return { ok: false, problem };
  if (fluid.kind === "water") {
    return { ok: true, fluid: waterAtPressure(pressure.pressureMPa), pressure };
  }
  const { kind, percent, basis } = fluid;
  const concentration = glycolConcentration(kind, percent, basis);
  if (concentration === null) return { ok: false, problem: outOfTables(percent, basis) };
  const { volumePercent } = concentration;
  return {
    ok: true,
    fluid: glycolAtPressure(kind, volumePercent, pressure.pressureMPa),
    pressure,
  };
}

function outOfTables(percent: number, basis: ConcentrationBasis): FluidProblem {
  const known = Number.isFinite(percent);
  return {
    code: "concentrationOutOfRange",
    place: "concentration",
    value: known ? percent : null,
    message: known
      ? `Glycol is not known at ${percent} % by ${basis}; its tables end at 60 % by volume.`
      : "The loop's glycol percentage is not known.",
    remedy:
      "Measure the concentration, with a refractometer for example, and enter it on the loop.",
  };
}
