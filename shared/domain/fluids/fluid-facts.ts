import { freezingPointC } from "./freezing-point";
import { isInterpolated } from "./glycol-at-pressure";
import { glycolConcentration } from "./glycol-concentration";
import { fluidForEnergy, type LoopFluid } from "./loop-fluid";

/** What a person should know of the fluid in a loop. */
export interface FluidFacts {
  readonly volumePercent: number;
  readonly massPercent: number;
  /** At atmospheric pressure. */
  readonly freezesAtC: number;
  /** Liquid and known between these at the loop's pressure. */
  readonly lowestC: number;
  readonly highestC: number;
  /** Its properties lie between water and the 10 % mixture, and its uncertainty is larger. */
  readonly interpolated: boolean;
}

/** Null where the fluid gives no energy at all. Example: 30 % propylene glycol by mass freezes at −12.7 °C. */
export function fluidFacts(fluid: LoopFluid, gaugeMPa: number | null): FluidFacts | null {
  const result = fluidForEnergy(fluid, gaugeMPa);
  if (!result.ok) return null;
  const { lowestC, highestC } = result.fluid;
  if (fluid.kind === "water") {
    return {
      volumePercent: 0,
      massPercent: 0,
      freezesAtC: 0,
      lowestC,
      highestC,
      interpolated: false,
    };
  }
  const concentration = glycolConcentration(fluid.kind, fluid.percent, fluid.basis);
  const freezesAtC = concentration && freezingPointC(fluid.kind, concentration.volumePercent);
  if (concentration === null || freezesAtC === null) return null;
  const interpolated = isInterpolated(concentration.volumePercent);
  return { ...concentration, freezesAtC, lowestC, highestC, interpolated };
}
