/**
 * Reynolds number of flow in a round pipe, Re = ρ·v·D/μ; the direction of the flow does not matter.
 *
 * Above 10 000 the velocity profile is turbulent enough for a clamp-on meter's own correction (common
 * practice, no source). Example: 0.9607717 m/s in a bore of 102.9651 mm with water at 11.2 °C and
 * 0.4 MPa → 78 381.
 */
export const TURBULENT_REYNOLDS = 10_000;

export interface PipeFlow {
  readonly velocityMPerS: number;
  readonly boreMm: number;
  readonly densityKgPerM3: number;
  readonly viscosityPaS: number;
}

export function reynoldsNumber(flow: PipeFlow): number {
  const metres = flow.boreMm / 1000;
  return (flow.densityKgPerM3 * Math.abs(flow.velocityMPerS) * metres) / flow.viscosityPaS;
}
