import type { Budget } from "./budget";
import type { BudgetTermKind } from "./point-evidence";

/** What a ± stands on: a record of the installation, in part or in whole, or assumptions alone. */
export type BudgetBasis = "evidence" | "partlyDefaults" | "defaults";

/** Terms that a record of the installation can speak for; formulas always stand alone. */
const RECORDED: ReadonlySet<BudgetTermKind> = new Set([
  "certificate",
  "drift",
  "zero",
  "bore",
  "profile",
  "remount",
  "probePair",
  "mounting",
  "pairDrift",
  "fluid",
  "flowNoise",
  "flowStep",
  "deltaTNoise",
  "deltaTStep",
  "meterLimits",
]);

/** The class is on record, the state its limits are put to is not. */
const ASSUMED_STATE: ReadonlySet<string> = new Set(["meterClassLeastState", "meterClassByPower"]);

/** An edit counts as evidence: somebody vouched for it and said why. */
export function budgetBasis(budget: Budget): BudgetBasis {
  const asked = budget.terms.filter((term) => RECORDED.has(term.kind));
  const known = asked.filter((term) => term.origin.from !== "default").length;
  if (asked.some((term) => ASSUMED_STATE.has(term.origin.code))) return "partlyDefaults";
  if (known === 0) return "defaults";
  return known === asked.length ? "evidence" : "partlyDefaults";
}
