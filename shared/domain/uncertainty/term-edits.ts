import type { BudgetTerm } from "./budget";
import { budgetTerm, originOf } from "./budget-term";
import type { BudgetTermKind, TermEdit } from "./point-evidence";

/** Shape of a term that an edit adds to a budget which had none of its kind. */
const SHAPE: Readonly<Record<BudgetTermKind, Pick<BudgetTerm, "unit" | "distribution" | "k">>> = {
  certificate: { unit: "%", distribution: "normal", k: 2 },
  drift: { unit: "%", distribution: "rectangular", k: null },
  zero: { unit: "m/s", distribution: "rectangular", k: null },
  bore: { unit: "mm", distribution: "standard", k: null },
  profile: { unit: "%", distribution: "rectangular", k: null },
  remount: { unit: "%", distribution: "standard", k: null },
  density: { unit: "%", distribution: "standard", k: null },
  enthalpy: { unit: "%", distribution: "standard", k: null },
  probePair: { unit: "K", distribution: "standard", k: null },
  mounting: { unit: "K", distribution: "rectangular", k: null },
  pairDrift: { unit: "K", distribution: "rectangular", k: null },
  fluid: { unit: "%", distribution: "standard", k: null },
  flowNoise: { unit: "%", distribution: "standard", k: null },
  flowStep: { unit: "L/s", distribution: "rectangular", k: null },
  deltaTNoise: { unit: "K", distribution: "standard", k: null },
  deltaTStep: { unit: "K", distribution: "rectangular", k: null },
  alignment: { unit: "%", distribution: "standard", k: null },
  meterLimits: { unit: "%", distribution: "rectangular", k: null },
  filled: { unit: "%", distribution: "standard", k: null },
};

/**
 * The terms with what somebody set by hand: the given value is replaced and unit and distribution
 * stay, so an edit of 0.2 on a ±0.10 K term means ±0.2 K. Of several edits of one term the last
 * counts. A term that was not there is added in the shape its kind always has.
 */
export function editedTerms(
  terms: readonly BudgetTerm[],
  edits: readonly TermEdit[],
): BudgetTerm[] {
  const result = [...terms];
  for (const edit of edits) {
    const place = result.findIndex((term) => term.kind === edit.kind);
    const before = result[place];
    const { unit, distribution, k } = before ?? SHAPE[edit.kind];
    const term = budgetTerm(
      edit.kind,
      { given: edit.value, unit, distribution, k },
      originOf("edited", "edited", { reason: edit.reason, before: before?.given ?? "" }),
    );
    if (before) result[place] = term;
    else result.push(term);
  }
  return result;
}
