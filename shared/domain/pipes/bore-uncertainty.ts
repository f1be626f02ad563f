/**
 * Standard uncertainty of a bore worked out from a taped or tabled outside diameter and several wall
 * readings, mm: u(ID)² = u(OD)² + 4·(u_gauge² + s²/n), because the wall is taken off twice. s is the
 * spread of the n readings (n − 1 in its denominator); by the GUM (JCGM 100), sections 4.2 and 5.1.
 *
 * Null with fewer than two wall readings: their spread is then unknown, not zero.
 * Example: u(OD) 0.2, gauge 0.05, walls 5.62, 5.71, 5.66, 5.69 mm → 0.2270095 mm.
 */
export function boreUncertaintyMm(
  outsideDiameterUncertaintyMm: number,
  gaugeUncertaintyMm: number,
  wallReadingsMm: readonly number[],
): number | null {
  const count = wallReadingsMm.length;
  if (count < 2) return null;
  const mean = wallReadingsMm.reduce((sum, wall) => sum + wall, 0) / count;
  const squares = wallReadingsMm.reduce((sum, wall) => sum + (wall - mean) ** 2, 0);
  const meanVariance = squares / (count - 1) / count;
  return Math.sqrt(
    outsideDiameterUncertaintyMm ** 2 + 4 * (gaugeUncertaintyMm ** 2 + meanVariance),
  );
}

/** Flow goes with the bore's square: a bore known to 0.22 % makes the flow uncertain by 0.44 %. */
export const FLOW_SENSITIVITY_TO_BORE = 2;
