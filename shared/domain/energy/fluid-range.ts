import type { FluidAtPressure } from "../fluids/fluid-at-pressure";
import type { FluidProblem } from "../fluids/fluid-problem";
import { temperatureProblem } from "../fluids/temperature-problem";
import { RowQuality, type ReadingColumns } from "../readings/reading-columns";

/** A measured row at which the loop's fluid is not liquid, or not known: it carries no energy. */
export interface OutsideFluid {
  readonly instantMs: number;
  readonly channel: "supply" | "return";
  readonly problem: FluidProblem;
}

/**
 * Counts the measured rows whose temperatures the fluid cannot have at the loop's pressure, with the
 * first few as examples. Energy leaves these rows out and counts them as without a reading.
 */
export function rowsOutsideFluid(
  columns: ReadingColumns,
  fluid: FluidAtPressure,
  mostExamples = 20,
): { readonly count: number; readonly examples: readonly OutsideFluid[] } {
  const { supplyC, returnC, quality, instantMs } = columns;
  const examples: OutsideFluid[] = [];
  let count = 0;
  if (!supplyC || !returnC) return { count, examples };
  for (let i = 0; i < quality.length; i++) {
    if (quality[i] !== RowQuality.measured) continue;
    for (const channel of ["supply", "return"] as const) {
      const temperatureC = (channel === "supply" ? supplyC : returnC)[i]!;
      const liquid = temperatureC >= fluid.lowestC && temperatureC <= fluid.highestC;
      if (liquid || Number.isNaN(temperatureC)) continue;
      const problem = temperatureProblem(fluid, temperatureC);
      if (!problem) continue;
      count++;
      if (examples.length < mostExamples) {
        examples.push({ instantMs: instantMs[i]!, channel, problem });
      }
      break;
    }
  }
  return { count, examples };
}
