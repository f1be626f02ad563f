import type { StandIn } from "./stand-in";

/** Expanded (k = 2) uncertainties, %; null where nobody stated them. */
export interface StandInClaims {
  /** Of what the portable measured. */
  readonly coveredPercent: number | null;
  /** Of the estimate as such: how well degree-hours or time scale the load. */
  readonly estimatePercent: number | null;
}

export interface StandInUncertainty {
  /** In kWh, in the order of the parts; null where it cannot be said. */
  readonly partsKwh: readonly (number | null)[];
  readonly totalKwh: number | null;
}

/**
 * Expanded uncertainty of energy that stands in for a meter's. The estimate is scaled from what the
 * portable measured, so the portable's error is in both parts with the same sign and they add there
 * as they are: U² = (U_covered·E_total/E_covered)² + U_estimate² (JCGM 100, 5.2.2 with r = 1).
 *
 * Example: 2093.7 kWh ± 5.6 % and 640.4859 kWh estimated ± 20 % → 117.2, 133.0 and together 199.6 kWh.
 */
export function standInUncertainty(standIn: StandIn, claims: StandInClaims): StandInUncertainty {
  const covered = claims.coveredPercent === null ? null : claims.coveredPercent / 100;
  const estimate = claims.estimatePercent === null ? null : claims.estimatePercent / 100;
  const partsKwh = standIn.parts.map(({ code, energyKwh }) => {
    if (covered === null) return null;
    if (code === "substitutedPortable") return energyKwh * covered;
    return estimate === null ? null : energyKwh * Math.hypot(covered, estimate);
  });
  const estimated = standIn.parts
    .filter(({ code }) => code !== "substitutedPortable")
    .reduce((sum, { energyKwh }) => sum + energyKwh, 0);
  const own = estimated === 0 ? 0 : estimate === null ? null : estimated * estimate;
  const totalKwh =
    covered === null || own === null ? null : Math.hypot(standIn.totalKwh * covered, own);
  return { partsKwh, totalKwh };
}
