import type { LoopFluid } from "../fluids/loop-fluid";
import type { Budget } from "./budget";
import { flowConditions } from "./conditions-of-flow";
import { pairConditions } from "./conditions-of-pair";
import { recordConditions } from "./conditions-of-record";
import type { PointEvidence } from "./point-evidence";
import type { ConditionVerdict } from "./verdict";

export interface ConditionsInput {
  readonly evidence: PointEvidence | null;
  /** Of the same evidence; its ΔT terms say what a small ΔT is. */
  readonly budget: Budget;
  readonly fluid: LoopFluid;
  /** Speed, Reynolds number and ΔT of the usual state or of the period asked about; null: unknown. */
  readonly state: {
    readonly velocityMPerS: number | null;
    readonly reynolds: number | null;
    readonly deltaTK: number | null;
  };
  /** The bore typed into the meter, and whether the flow has since been put right by it. */
  readonly enteredBoreMm: number | null;
  readonly enteredBoreCorrected: boolean;
  /** The day certificates and checks are judged by, YYYY-MM-DD in the site's zone. */
  readonly onDate: string;
  readonly intervalS: number | null;
  /** Whether the bath check's mean difference has been taken off the readings. */
  readonly pairDifferenceCorrected: boolean;
  /** Covered over expected time, 0 to 1; null where no period is asked about. */
  readonly completeness: number | null;
}

/**
 * The conditions under which a point is measured, one verdict or more for each check that can be made.
 *
 * A failed check names what it does to the figures: the term of the budget that stands wider for it,
 * or the use it bars. What cannot be checked because a state is unknown gives no verdict; what should
 * be on record and is not, does. Limits are common practice except where a check names its source.
 * Example: 0.92 m behind a bend in a bore of 102.965 mm → "straightRunUpstreamShort", look, profile.
 */
export function conditionVerdicts(input: ConditionsInput): ConditionVerdict[] {
  return [...flowConditions(input), ...pairConditions(input), ...recordConditions(input)];
}
