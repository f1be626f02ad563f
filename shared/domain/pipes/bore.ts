/**
 * Bore and water speed of a round pipe.
 * Example: outside diameter 114.305 mm, wall 5.67 mm → bore 102.965 mm; 8 L/s → 0.960771 m/s.
 */

/** Inside diameter in mm: outside − 2·wall − 2·lining. Null where nothing would be left to flow in. */
export function boreMm(outsideDiameterMm: number, wallMm: number, liningMm = 0): number | null {
  const bore = outsideDiameterMm - 2 * wallMm - 2 * liningMm;
  return bore > 0 && wallMm > 0 && liningMm >= 0 ? bore : null;
}

/** Outside diameter in mm from a tape round the pipe. */
export function outsideDiameterFromCircumferenceMm(circumferenceMm: number): number {
  return circumferenceMm / Math.PI;
}

/** Flow area in m². */
export function flowAreaM2(bore: number): number {
  return (Math.PI / 4) * (bore / 1000) ** 2;
}

/** Mean water speed in m/s; keeps the sign of the flow. */
export function velocityMPerS(flowM3PerHour: number, bore: number): number {
  return flowM3PerHour / 3600 / flowAreaM2(bore);
}

/** Flow in m³/h at a mean water speed in m/s. */
export function flowAtVelocityM3PerHour(speedMPerS: number, bore: number): number {
  return speedMPerS * flowAreaM2(bore) * 3600;
}
