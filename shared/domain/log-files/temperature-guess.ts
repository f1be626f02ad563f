import type { TemperatureUnit } from "./recipe";

/** Liquid water in loops, with a margin for probes lying in a bag and for pressurised hot loops. */
const COLDEST_C = 1;
const HOTTEST_C = 130;

/**
 * The only unit in which values of this range are temperatures of water in a loop, or null if several or
 * none fit: 6 to 12 are °C (as °F they would be ice); 44 to 54 may be chilled water in °F or hot in °C.
 */
export function guessTemperatureUnit(
  range: { readonly min: number; readonly max: number } | null,
): TemperatureUnit | null {
  if (range === null) return null;
  const fits = (low: number, high: number): boolean => range.min >= low && range.max <= high;
  const asC = fits(COLDEST_C, HOTTEST_C);
  const asF = fits(COLDEST_C * 1.8 + 32, HOTTEST_C * 1.8 + 32);
  const asK = fits(COLDEST_C + 273.15, HOTTEST_C + 273.15);
  const found: TemperatureUnit[] = [];
  if (asC) found.push("degC");
  if (asF) found.push("degF");
  if (asK) found.push("K");
  return found.length === 1 ? (found[0] as TemperatureUnit) : null;
}
