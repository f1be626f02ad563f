import type { FluidAtPressure } from "./fluid-at-pressure";
import type { FluidProblem } from "./fluid-problem";
import { waterProblem } from "./water";

/**
 * Says why a fluid has no properties at a temperature in °C; null where it has. The bounds are the
 * fluid's own `lowestC` and `highestC`, so that a row left out of the energy always has its reason.
 */
export function temperatureProblem(
  fluid: FluidAtPressure,
  temperatureC: number,
): FluidProblem | null {
  return waterProblem(temperatureC, fluid.pressureMPa);
}
