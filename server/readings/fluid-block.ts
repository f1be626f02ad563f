import type { FluidForEnergy } from "@shared/domain/fluids/loop-fluid";
import type { FluidBlock } from "@shared/contracts/places";

/** Why a loop's fluid gives no energy, whatever the readings are; null where it gives some. */
export function fluidBlock(fluid: FluidForEnergy): FluidBlock | null {
  if (fluid.ok) return null;
  return fluid.problem.place === "concentration" ? "concentration" : "pressure";
}

/** Where the loop's fluid is liquid and known; null where it gives no energy at all. */
export function liquidC(fluid: FluidForEnergy): { lowest: number; highest: number } | null {
  return fluid.ok ? { lowest: fluid.fluid.lowestC, highest: fluid.fluid.highestC } : null;
}
