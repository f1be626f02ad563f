import type { FluidProblem } from "../fluids/fluid-problem";
import { waterProblem } from "../fluids/water";
import type { WaterAtPressure } from "../fluids/water-at-pressure";
import { RowQuality, type ReadingColumns } from "../readings/reading-columns";

/** A measured row that is no liquid water and therefore carries no energy. */
export interface OutsideWater {
  readonly instantMs: number;
  readonly channel: "supply" | "return";
  readonly problem: FluidProblem;
}

/**
 * Counts the measured rows whose temperatures water cannot have at the loop's pressure, with the
 * first few as examples. Energy leaves these rows out and counts them as without a reading.
 */
export function rowsOutsideWater(
  columns: ReadingColumns,
  water: WaterAtPressure,
  mostExamples = 20,
): { readonly count: number; readonly examples: readonly OutsideWater[] } {
  const { supplyC, returnC, quality, instantMs } = columns;
  const examples: OutsideWater[] = [];
  let count = 0;
  if (!supplyC || !returnC) return { count, examples };
  for (let i = 0; i < quality.length; i++) {
    if (quality[i] !== RowQuality.measured) continue;
    for (const channel of ["supply", "return"] as const) {
      const temperatureC = (channel === "supply" ? supplyC : returnC)[i]!;
      const liquid = temperatureC >= water.lowestC && temperatureC <= water.highestC;
      if (liquid || Number.isNaN(temperatureC)) continue;
      const problem = waterProblem(temperatureC, water.pressureMPa);
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
