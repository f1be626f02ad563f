import type { StandInCode } from "./codes";

/** A meter's outage, and what another instrument measured of it. */
export interface Outage {
  readonly hours: number;
  readonly coveredHours: number;
  readonly coveredKwh: number;
  /** Degree-hours of the covered and the missing time, K·h; null: time alone scales the estimate. */
  readonly degreeHours: { readonly covered: number; readonly missing: number } | null;
}

export interface StandInPart {
  readonly code: StandInCode;
  readonly energyKwh: number;
  readonly hours: number;
}

export interface StandIn {
  /** Measured by the other instrument, then the estimate for the rest; never added without a label. */
  readonly parts: readonly StandInPart[];
  readonly totalKwh: number;
  /** Of the total, %; null where the total is 0. */
  readonly estimatedPercent: number | null;
}

/**
 * Energy in place of a meter that was away: what a portable instrument measured, and for the hours it
 * did not cover an estimate, E = E_covered · DH_missing/DH_covered by degree-hours, or by hours where
 * there are none. Degree-hours assume a load that follows the weather through the base temperature.
 *
 * Null where nothing was covered (of time or degree-hours) to scale from, or the covered time is
 * longer than the outage. Example: 2093.7 kWh in 61.25 of 80 h, 820.5 and 251.0 K·h →
 * 640.4859 kWh estimated, 2734.186 kWh in all, 23.4251 % of it estimated.
 */
export function standIn(outage: Outage): StandIn | null {
  const { hours, coveredHours, coveredKwh, degreeHours } = outage;
  const missingHours = hours - coveredHours;
  if (!(missingHours >= 0)) return null;
  const [covered, missing] = degreeHours
    ? [degreeHours.covered, degreeHours.missing]
    : [coveredHours, missingHours];
  const nothingMissing = missingHours === 0;
  if (!nothingMissing && !(covered > 0)) return null;
  const estimatedKwh = nothingMissing ? 0 : coveredKwh * (missing / covered);
  const totalKwh = coveredKwh + estimatedKwh;
  const measured: StandInPart = {
    code: "substitutedPortable",
    energyKwh: coveredKwh,
    hours: coveredHours,
  };
  const estimated: StandInPart = {
    code: degreeHours ? "estimatedDegreeHours" : "estimatedTime",
    energyKwh: estimatedKwh,
    hours: missingHours,
  };
  return {
    parts: nothingMissing ? [measured] : [measured, estimated],
    totalKwh,
    estimatedPercent: totalKwh === 0 ? null : (100 * estimatedKwh) / totalKwh,
  };
}
