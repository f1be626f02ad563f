import { bathCheckVerdicts } from "./bath-check";
import type { Budget } from "./budget";
import type { ConditionsInput } from "./conditions";
import { mountingKind } from "./mounting-term";
import { checkIsOfProbes } from "./pair-terms";
import { type ConditionVerdict, fine, widens } from "./verdict";

/** ΔT should be ten times its own standard uncertainty, for about ±20 % of heat. */
const LEAST_TIMES = 10;

/** ΔT, the pair's check in one bath and how the probes sit. */
export function pairConditions(input: ConditionsInput): ConditionVerdict[] {
  return [...deltaTVerdict(input), ...bathVerdicts(input), mountingVerdict(input)];
}

/**
 * Standard uncertainty of one reading's ΔT, K: the budget's ΔT terms, all of which are in K.
 * Example: the worked interval's budget → 0.0704 K.
 */
export function deltaTStandardK(budget: Budget): number {
  const ofDeltaT = budget.terms.filter((term) => term.actsOn === "deltaT");
  return Math.hypot(...ofDeltaT.map((term) => term.standard));
}

function deltaTVerdict({ budget, state }: ConditionsInput): ConditionVerdict[] {
  const { deltaTK } = state;
  if (deltaTK === null) return [];
  const standardK = deltaTStandardK(budget);
  const values = { deltaTK, standardK, times: LEAST_TIMES };
  return Math.abs(deltaTK) >= LEAST_TIMES * standardK
    ? [fine("deltaT", "deltaTFine", values)]
    : [widens("deltaT", "deltaTSmall", values, "probePair")];
}

function bathVerdicts(input: ConditionsInput): ConditionVerdict[] {
  const { evidence, onDate } = input;
  const check = evidence?.bathCheck ?? null;
  const probes = evidence?.probes ?? null;
  if (check === null || probes === null) {
    return [widens("bathCheck", "bathCheckMissing", {}, "probePair")];
  }
  if (!checkIsOfProbes(check, probes)) {
    const { firstSerial, secondSerial } = check;
    const values = { firstSerial, secondSerial };
    return [widens("bathCheck", "bathCheckOtherProbes", values, "probePair")];
  }
  const judged = bathCheckVerdicts(check, onDate);
  const { meanDifferenceK } = check;
  return input.pairDifferenceCorrected || meanDifferenceK === 0
    ? judged
    : [...judged, widens("bathCheck", "bathCheckNotCorrected", { meanDifferenceK }, "probePair")];
}

function mountingVerdict({ evidence }: ConditionsInput): ConditionVerdict {
  switch (mountingKind(evidence?.probes ?? null)) {
    case "unknown":
      return widens("mounting", "mountingUnknown", {}, "mounting");
    case "unequal":
      return widens("mounting", "mountingUnequal", {}, "mounting");
    case "uninsulated":
      return widens("mounting", "mountingUninsulated", {}, "mounting");
    default:
      return fine("mounting", "mountingFine", {});
  }
}
