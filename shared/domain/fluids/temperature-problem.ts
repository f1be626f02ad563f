import type { FluidAtPressure } from "./fluid-at-pressure";
import type { FluidProblem } from "./fluid-problem";
import { HIGHEST_GLYCOL_C, LOWEST_GLYCOL_C } from "./glycol-ashrae";
import { waterProblem } from "./water";

/**
 * Says why a fluid has no properties at a temperature in °C; null where it has. The bounds are the
 * fluid's own `lowestC` and `highestC`, so that a row left out of the energy always has its reason.
 */
export function temperatureProblem(
  fluid: FluidAtPressure,
  temperatureC: number,
): FluidProblem | null {
  const { kind, lowestC, highestC, pressureMPa } = fluid;
  if (kind === "water" || Number.isNaN(temperatureC))
    return waterProblem(temperatureC, pressureMPa);
  if (temperatureC >= lowestC && temperatureC <= highestC) return null;
  return { place: "temperature", value: temperatureC, ...glycolReason(fluid, temperatureC) };
}

function glycolReason(
  { lowestC, highestC, pressureMPa }: FluidAtPressure,
  temperatureC: number,
): Pick<FluidProblem, "code" | "message" | "remedy"> {
  const remedy = "Check the column's unit, the probe, and the glycol's percentage on the loop.";
  if (temperatureC > highestC) {
    return highestC < HIGHEST_GLYCOL_C
      ? {
          code: "boiling",
          message: `${temperatureC} °C at ${pressureMPa} MPa absolute is above water's boiling point.`,
          remedy: "Check the loop's gauge pressure and the probe.",
        }
      : {
          code: "aboveRange",
          message: `${temperatureC} °C is above 100 °C, where the glycol tables end.`,
          remedy,
        };
  }
  // A mixture's own bound is its freezing point, except where the tables end before it freezes, at
  // −35 °C, and where it is interpolated from water, at 0 °C.
  const freezes = lowestC > LOWEST_GLYCOL_C && lowestC < 0;
  return freezes
    ? {
        code: "belowFreezing",
        message: `${temperatureC} °C is below the mixture's freezing point of ${lowestC.toFixed(1)} °C.`,
        remedy,
      }
    : {
        code: "belowRange",
        message: `${temperatureC} °C is below ${lowestC} °C, where this mixture's properties end.`,
        remedy,
      };
}
