/**
 * Standard uncertainties from what certificates and data sheets give (JCGM 100, the GUM, sections
 * 4.3.3, 4.3.7 and F.2.2.1). Units stay as they are; every argument is ≥ 0, and a sign is dropped.
 */

/**
 * Of limits ±a within which every value is as likely: a/√3.
 * Example: ±0.10 K → 0.0577350 K.
 */
export function standardFromHalfWidth(halfWidth: number): number {
  return Math.abs(halfWidth) / Math.sqrt(3);
}

/**
 * Of an expanded uncertainty and the coverage factor printed with it: U/k, k > 0.
 * Example: 1.0 % with k = 2 → 0.5 %.
 */
export function standardFromExpanded(expanded: number, k: number): number {
  return Math.abs(expanded) / k;
}

/**
 * Of one reading rounded to a step: the step is the full width of a rectangle, step/√12.
 * Example: 0.01 L/s → 0.00288675 L/s.
 */
export function standardFromStep(step: number): number {
  return Math.abs(step) / Math.sqrt(12);
}
