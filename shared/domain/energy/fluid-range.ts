import type { FluidAtPressure } from "../fluids/fluid-at-pressure";
import type { FluidProblem } from "../fluids/fluid-problem";
import { temperatureProblem } from "../fluids/temperature-problem";
import { RowQuality, type ReadingColumns } from "../readings/reading-columns";

// Taken out of its module once: it is compared with in every row.
const MEASURED = RowQuality.measured;

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
  const { lowestC, highestC } = fluid;
  for (let i = 0; i < quality.length; i++) {
    if (quality[i] !== MEASURED) continue;
    const supply = supplyC[i]!;
    const back = returnC[i]!;
    // Nearly every row leaves here.
    if (supply >= lowestC && supply <= highestC && back >= lowestC && back <= highestC) continue;
    for (const channel of ["supply", "return"] as const) {
      const temperatureC = channel === "supply" ? supply : back;
      const liquid = temperatureC >= lowestC && temperatureC <= highestC;
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
