import type { BudgetTermKind } from "./point-evidence";
import type { VerdictCode, VerdictValues } from "./codes";

/** What a check of the measuring conditions looks at. */
export type ConditionCheck =
  | "velocity"
  | "reynolds"
  | "deltaT"
  | "soundSpeed"
  | "straightRun"
  | "zero"
  | "bore"
  | "bathCheck"
  | "mounting"
  | "certificate"
  | "clock"
  | "fluid"
  | "completeness";

export type VerdictWeight = "fine" | "look" | "stop";

/** What a failed check does to the figures: it widens a term of the budget or bars a use. */
export type VerdictEffect =
  | { readonly kind: "term"; readonly term: BudgetTermKind }
  | { readonly kind: "block"; readonly blocks: "use" | "billing" };

/** A condition looked at: what was found, what it means, and the term or block it adds. */
export interface ConditionVerdict {
  readonly check: ConditionCheck;
  readonly weight: VerdictWeight;
  readonly code: VerdictCode;
  readonly values: Record<string, string | number>;
  /** Null only where the weight is `fine`. */
  readonly adds: VerdictEffect | null;
}

export function fine<C extends VerdictCode>(
  check: ConditionCheck,
  code: C,
  values: VerdictValues<C>,
): ConditionVerdict {
  return { check, weight: "fine", code, values, adds: null };
}

/** Worth a look: the budget's term is wider for it. */
export function widens<C extends VerdictCode>(
  check: ConditionCheck,
  code: C,
  values: VerdictValues<C>,
  term: BudgetTermKind,
): ConditionVerdict {
  return { check, weight: "look", code, values, adds: { kind: "term", term } };
}

export function blocks<C extends VerdictCode>(
  check: ConditionCheck,
  code: C,
  values: VerdictValues<C>,
  use: "use" | "billing",
): ConditionVerdict {
  return { check, weight: "stop", code, values, adds: { kind: "block", blocks: use } };
}
