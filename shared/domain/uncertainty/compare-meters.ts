import { agreement, type Agreement, type Compared } from "./agreement";
import type { AgreementCode } from "./codes";

/** What one meter says of a period; volume and ΔT are null where it does not tell. */
export interface MeterFigures {
  readonly energyKwh: Compared;
  readonly volumeM3: Compared | null;
  readonly deltaTK: Compared | null;
}

export const UNDECIDED_REASONS = [
  "firstWithoutUncertainty",
  "secondWithoutUncertainty",
  "noUncertaintyAtAll",
  "sharedInstruments",
  "coverageLow",
] as const;
/** Why it cannot be said whether two meters agree. */
export type UndecidedReason = (typeof UNDECIDED_REASONS)[number];

export interface MeterComparison {
  readonly energy: Agreement;
  readonly volume: Agreement | null;
  readonly deltaT: Agreement | null;
  /** Of energy, unless something known of the two forbids a word on it. */
  readonly verdict: AgreementCode;
  readonly because: readonly UndecidedReason[];
  /** Energy agrees while volume or ΔT does not: their errors cancel, for now. */
  readonly errorsCancel: boolean;
}

/**
 * Two meters over one period: energy, volume and ΔT each by itself, because a meter that reads too
 * much flow and too little ΔT can be right in energy, and will be wrong at another load. E_n is that of
 * `agreement`. `obstacles` are reasons from outside the figures, such as a probe both used; with any,
 * the difference and E_n stand, but nothing is concluded from them.
 *
 * Example: 100 ± 3 against 99 ± 3 kWh agrees; with 10 ± 0.2 against 9 ± 0.2 m³ behind it, errors cancel.
 */
export function compareMeters(
  first: MeterFigures,
  second: MeterFigures,
  obstacles: readonly UndecidedReason[] = [],
): MeterComparison {
  const energy = agreement(first.energyKwh, second.energyKwh);
  const volume = bothOrNull(first.volumeM3, second.volumeM3);
  const deltaT = bothOrNull(first.deltaTK, second.deltaTK);
  const because = [...withoutUncertainty(first, second, energy), ...obstacles];
  const verdict = because.length > 0 ? "inconclusive" : energy.code;
  const partsDisagree = volume?.code === "disagree" || deltaT?.code === "disagree";
  return {
    energy,
    volume,
    deltaT,
    verdict,
    because,
    errorsCancel: energy.code === "agree" && partsDisagree,
  };
}

function bothOrNull(first: Compared | null, second: Compared | null): Agreement | null {
  return first === null || second === null ? null : agreement(first, second);
}

function withoutUncertainty(
  first: MeterFigures,
  second: MeterFigures,
  energy: Agreement,
): UndecidedReason[] {
  const missing: UndecidedReason[] = [];
  if (first.energyKwh.expanded === null) missing.push("firstWithoutUncertainty");
  if (second.energyKwh.expanded === null) missing.push("secondWithoutUncertainty");
  if (missing.length === 0 && energy.en === null) missing.push("noUncertaintyAtAll");
  return missing;
}
