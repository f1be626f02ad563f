import type { MeterSide } from "../energy/power";
import type { FluidAtPressure } from "../fluids/fluid-at-pressure";
import { reynoldsNumber } from "../pipes/reynolds-number";
import { boreFromEvidence, type NominalPipe } from "./bore-from-evidence";
import type { Budget } from "./budget";
import { certificateTerms } from "./certificate-terms";
import { fluidTerms } from "./fluid-terms";
import { mountingTerm } from "./mounting-term";
import { pairTerms } from "./pair-terms";
import { boreTerm, profileTerm, remountTerm } from "./pipe-terms";
import type { PointEvidence } from "./point-evidence";
import { ASSUMED_AUTOCORRELATION, randomTerms } from "./random-terms";
import { editedTerms } from "./term-edits";
import { zeroTerm } from "./zero-term";

export interface BudgetInput {
  /** Null: no installation speaks for the time, every term is a default. */
  readonly evidence: PointEvidence | null;
  /** Nominal dimensions of the point's pipe, used where no wall was measured. */
  readonly pipe: NominalPipe | null;
  /** What is in the loop; null where it cannot be computed. */
  readonly fluid: FluidAtPressure | null;
  /** What a mixture adds to the heat coefficient, standard %, 0 for water. */
  readonly fluidHeatPercent: number;
  readonly meterSide: MeterSide;
  /** The day certificates and checks are judged by, YYYY-MM-DD in the site's zone. */
  readonly onDate: string;
  /** Usual temperatures and speed; null where nothing is known of the loop. */
  readonly state: UsualState | null;
  /** Time between readings, s; null or left out where unknown. */
  readonly intervalS?: number | null;
  /** Whether the mean difference of the bath check has been taken off the readings; true if left out. */
  readonly pairDifferenceCorrected?: boolean;
}

export interface UsualState {
  readonly supplyC: number;
  readonly returnC: number;
  readonly velocityMPerS: number | null;
}

/**
 * The uncertainty budget of a point from what is on record of how it is measured; JCGM 100 (GUM),
 * sections 4 and 5. Every term says by a code where its size comes from: evidence, a default on the
 * wide side, or somebody's edit.
 *
 * Terms and defaults are described in certificate-terms, zero-term, pipe-terms, bore-from-evidence,
 * pair-terms, mounting-term, fluid-terms and random-terms. Total: an empty record gives a budget too.
 * Example: the worked interval of the tests has sixteen terms and U(k=2) = 4.26092 % of its power.
 */
export function budgetFromEvidence(input: BudgetInput): Budget {
  const { evidence, fluid, state, onDate } = input;
  const bore = boreFromEvidence(evidence?.pipe ?? null, input.pipe);
  const meterC = state && (input.meterSide === "supply" ? state.supplyC : state.returnC);
  const terms = [
    ...certificateTerms(evidence?.flowMeter ?? null, onDate),
    zeroTerm(evidence?.zero ?? null, bore !== null),
    boreTerm(bore),
    profileTerm(evidence?.straightRun ?? null, bore, usualReynolds(input, bore?.boreMm ?? null)),
    remountTerm(evidence?.remountPercent ?? null),
    ...fluidTerms(fluid, meterC, input.fluidHeatPercent, evidence?.fluidTestedOn ?? null, onDate),
    ...pairTerms(
      evidence?.probes ?? null,
      evidence?.bathCheck ?? null,
      input.pairDifferenceCorrected ?? true,
      state,
      onDate,
    ),
    mountingTerm(evidence?.probes ?? null),
    ...randomTerms(evidence, input.intervalS ?? null),
  ];
  return {
    terms: editedTerms(terms, evidence?.edits ?? []),
    boreMm: bore?.boreMm ?? null,
    autocorrelation: evidence?.noise?.autocorrelation ?? ASSUMED_AUTOCORRELATION,
  };
}

function usualReynolds({ fluid, state, meterSide }: BudgetInput, boreMm: number | null) {
  if (fluid === null || state === null || state.velocityMPerS === null || boreMm === null) {
    return null;
  }
  const meterC = meterSide === "supply" ? state.supplyC : state.returnC;
  return reynoldsNumber({
    velocityMPerS: state.velocityMPerS,
    boreMm,
    densityKgPerM3: fluid.density(meterC),
    viscosityPaS: fluid.viscosityPaS(meterC),
  });
}
