import type { SizedBudget } from "@shared/contracts/evidence";
import type { Budget } from "@shared/domain/uncertainty/budget";
import { combineInterval } from "@shared/domain/uncertainty/combine-interval";
import type { BudgetState } from "./usual-state";

/** Terms of a budget put to a state, largest first; in the budget's order where they cannot be put. */
export function sizeBudget(budget: Budget, { at, flowM3PerHour }: BudgetState): SizedBudget {
  const { velocityMPerS, deltaTK } = at;
  const combined = combineInterval(budget, {
    figure: "power",
    value: 1,
    flowM3PerHour,
    velocityMPerS,
    deltaTK,
  });
  return {
    terms: combined
      ? combined.terms.map(({ term, percent }) => ({ ...presentTerm(term), percent }))
      : budget.terms.map((term) => ({ ...presentTerm(term), percent: null })),
    expandedPercent: combined?.expandedPercent ?? null,
    at,
  };
}

export function presentTerm({ origin, ...term }: Budget["terms"][number]) {
  return { ...term, origin: { ...origin, values: { ...origin.values } } };
}
