import { toM3PerHour } from "@shared/domain/units/flow";
import type { FlowUnit } from "@shared/domain/log-files/recipe";

/** Usual water speed in pipes, m/s; common practice, no source. */
export const USUAL_SPEED_M_PER_S = { least: 0.2, greatest: 2.5 } as const;

export interface SpeedUnderUnit {
  readonly unit: FlowUnit;
  readonly leastMPerS: number;
  readonly greatestMPerS: number;
  readonly likely: boolean;
}

/**
 * Water speed that a column's greatest and least values mean in a pipe, for each flow unit it could
 * be in: what settles an unknown unit. The least is clipped at 0, a stopped pump being no clue.
 */
export function speedsByUnit(
  values: { readonly min: number; readonly max: number },
  insideDiameterMm: number,
  units: readonly FlowUnit[],
): SpeedUnderUnit[] {
  const areaM2 = (Math.PI / 4) * (insideDiameterMm / 1000) ** 2;
  return units.map((unit) => {
    const speed = (value: number) => toM3PerHour(value, unit) / 3600 / areaM2;
    const leastMPerS = Math.max(0, speed(values.min));
    const greatestMPerS = speed(values.max);
    return {
      unit,
      leastMPerS,
      greatestMPerS,
      likely:
        greatestMPerS >= USUAL_SPEED_M_PER_S.least && greatestMPerS <= USUAL_SPEED_M_PER_S.greatest,
    };
  });
}
