import { velocityMPerS } from "../pipes/bore";
import type { Budget, CombinedUncertainty } from "./budget";
import { combineTerms, type PutTerm } from "./combine-terms";
import { touches, type UncertainFigure } from "./figures";
import { percentOfTerm } from "./put-term";

export interface IntervalState {
  readonly figure: UncertainFigure;
  /** The figure itself: kWh, kW, m³ or K. */
  readonly value: number;
  readonly flowM3PerHour: number | null;
  /** Null or left out: from the flow and the budget's bore. */
  readonly velocityMPerS?: number | null;
  readonly deltaTK: number | null;
}

/**
 * Uncertainty of one reading's figure: every term put to the state, u² = Σ u_i² (JCGM 100, 5.1.6), and
 * U = 2·u. One reading averages nothing out, so random terms keep their size.
 *
 * Null where a term cannot be put: no flow, no ΔT, or nothing known of them. Then the relative
 * uncertainty has no bound, and no ± is better than a small one.
 * Example: 8.000 L/s, 5.90 K, 0.960771 m/s, 197.798 kW → u_S 1.92038, u_R 0.922496, u_c 2.13046 %,
 * U = 4.26092 % = 8.42802 kW.
 */
export function combineInterval(budget: Budget, state: IntervalState): CombinedUncertainty | null {
  const { boreMm } = budget;
  const { flowM3PerHour, deltaTK, figure } = state;
  const fromFlow =
    flowM3PerHour === null || boreMm === null ? null : velocityMPerS(flowM3PerHour, boreMm);
  const at = {
    flowM3PerHour,
    velocityMPerS: state.velocityMPerS ?? fromFlow,
    deltaTK,
    boreMm,
  };
  const put: PutTerm[] = [];
  for (const term of budget.terms) {
    if (!touches(term, figure)) continue;
    const percent = percentOfTerm(term, at);
    if (percent === null) return null;
    put.push({ term, percent, shrinks: term.nature === "random" });
  }
  return combineTerms(put, state.value, 1, 1);
}
