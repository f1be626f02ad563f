import { flowAtVelocityM3PerHour } from "../pipes/bore";
import type { Budget, BudgetTerm, CombinedUncertainty } from "./budget";
import { budgetTerm, originOf, standard } from "./budget-term";
import { combineTerms, type PutTerm } from "./combine-terms";
import { effectiveSamples } from "./effective-samples";
import { touches, type UncertainFigure } from "./figures";
import { percentOfTerm } from "./put-term";

export interface PeriodState {
  readonly figure: UncertainFigure;
  /** The figure itself, filled time included: kWh, kW, m³ or K. */
  readonly value: number;
  /** Σ(q·Δθ)/Σq, K. */
  readonly flowWeightedDeltaTK: number | null;
  /** Σ(v·Δθ)/ΣΔθ, m/s. */
  readonly deltaTWeightedVelocityMPerS: number | null;
  /** Over the time water moved, m/s. */
  readonly meanVelocityMPerS: number | null;
  /** For logger steps in L/s; null or left out: from the mean speed and the budget's bore. */
  readonly meanFlowM3PerHour?: number | null;
  /** Readings that went into the figure. */
  readonly samples: number;
  /** Greatest less least reading; null: not known, so that the logger's step is not taken to shrink. */
  readonly flowSpreadM3PerHour: number | null;
  readonly deltaTSpreadK: number | null;
  /** Part of the figure that was filled in, 0 to 1. */
  readonly filledShare?: number;
  /** Standard uncertainty of the filled part, % of itself. */
  readonly filledPercent?: number;
}

/** Filled energy whose uncertainty nobody worked out; common practice. */
const UNKNOWN_FILL_PERCENT = 30;

/**
 * Uncertainty of a total or mean over a period (JCGM 100, 5.1 and 5.2; F.1.2.1 for what does not
 * average out).
 *
 * Systematic terms keep their size, however many readings there are: a probe's offset counts as
 * δ ÷ flow-weighted ΔT, a zero's as z ÷ ΔT-weighted speed. Random terms shrink by √N_eff,
 * N_eff = N(1−ρ)/(1+ρ). A logger's step shrinks only where the signal moves by more than one step,
 * else the same rounding repeats. What was filled adds a term of its own, share × its uncertainty.
 * Volume takes the terms of flow with the mean speed, ΔT the terms of ΔT.
 *
 * Dividing the whole by √N is the classic error: with the worked interval's budget, 2016 like
 * readings and ρ = 0.6 leave 1.9208 %, not 0.047 %. Null where a term cannot be put, see
 * combine-interval, and where there are no readings.
 */
export function combinePeriod(budget: Budget, state: PeriodState): CombinedUncertainty | null {
  const { figure, samples } = state;
  if (!(samples >= 1)) return null;
  const { boreMm } = budget;
  const meanFlow =
    state.meanFlowM3PerHour ??
    (state.meanVelocityMPerS === null || boreMm === null
      ? null
      : flowAtVelocityM3PerHour(state.meanVelocityMPerS, boreMm));
  const at = {
    flowM3PerHour: meanFlow,
    velocityMPerS:
      figure === "volume" ? state.meanVelocityMPerS : state.deltaTWeightedVelocityMPerS,
    deltaTK: state.flowWeightedDeltaTK,
    boreMm,
  };
  const effective = effectiveSamples(samples, budget.autocorrelation);
  const put: PutTerm[] = [];
  for (const term of budget.terms) {
    if (!touches(term, figure)) continue;
    const percent = percentOfTerm(term, at);
    if (percent === null) return null;
    const shrinks = term.nature === "random" && averagesOut(term, state);
    put.push({ term, percent: shrinks ? percent / Math.sqrt(effective) : percent, shrinks });
  }
  const filled = filledTerm(budget, state);
  if (filled) put.push({ term: filled, percent: filled.standard, shrinks: false });
  return combineTerms(put, state.value, samples, effective);
}

function averagesOut(term: BudgetTerm, state: PeriodState): boolean {
  if (term.kind === "flowStep") {
    const { flowSpreadM3PerHour } = state;
    return flowSpreadM3PerHour !== null && flowSpreadM3PerHour / 3.6 > term.given;
  }
  if (term.kind === "deltaTStep") {
    return state.deltaTSpreadK !== null && state.deltaTSpreadK > term.given;
  }
  return true;
}

/** Null where nothing was filled. A filled term of the budget, set by hand, says how well it is known. */
function filledTerm(budget: Budget, state: PeriodState): BudgetTerm | null {
  const share = state.filledShare ?? 0;
  if (!(share > 0)) return null;
  const byHand = budget.terms.find((term) => term.kind === "filled");
  const filledPercent = byHand?.standard ?? state.filledPercent ?? UNKNOWN_FILL_PERCENT;
  const origin = originOf(
    state.filledPercent === undefined ? "default" : "evidence",
    "filledShare",
    {
      sharePercent: 100 * share,
      filledPercent,
    },
  );
  return budgetTerm("filled", standard(share * filledPercent, "%"), byHand?.origin ?? origin);
}
