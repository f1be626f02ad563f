import type { BudgetTerm, CombinedTerm, CombinedUncertainty } from "./budget";

/** About 95 % of a normal distribution; what every ± of the product is printed with. */
export const COVERAGE_FACTOR = 2;

/** One term relative to the figure, and whether it has stayed at its full size. */
export interface PutTerm {
  readonly term: BudgetTerm;
  readonly percent: number;
  /** Random terms shrink with the number of readings; one that cannot is counted as systematic. */
  readonly shrinks: boolean;
}

/**
 * Root of the sum of squares of independent terms, expanded with k = 2; JCGM 100, 5.1.2 and 6.2.
 * Example: 1.92038 % systematic and 0.922496 % random → 2.13046 %, U = 4.26092 %.
 */
export function combineTerms(
  put: readonly PutTerm[],
  value: number,
  samples: number,
  effectiveSamples: number,
): CombinedUncertainty {
  const systematicPercent = rootSumOfSquares(put.filter((each) => !each.shrinks));
  const randomPercent = rootSumOfSquares(put.filter((each) => each.shrinks));
  const combinedPercent = Math.hypot(systematicPercent, randomPercent);
  const expandedPercent = COVERAGE_FACTOR * combinedPercent;
  const perPercent = Math.abs(value) / 100;
  const terms: CombinedTerm[] = put
    .map(({ term, percent }) => ({ term, percent, absolute: percent * perPercent }))
    .sort((a, b) => b.percent - a.percent);
  return {
    terms,
    systematicPercent,
    randomPercent,
    combinedPercent,
    k: COVERAGE_FACTOR,
    expandedPercent,
    expanded: expandedPercent * perPercent,
    samples,
    effectiveSamples,
  };
}

function rootSumOfSquares(put: readonly PutTerm[]): number {
  return Math.hypot(...put.map((each) => each.percent));
}
