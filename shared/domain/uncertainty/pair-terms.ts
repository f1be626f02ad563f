import { BATH_CHECK_DAYS, exceedsK, MEAN_LIMIT_K } from "./bath-check";
import type { BudgetTerm } from "./budget";
import { budgetTerm, halfWidth, originOf, standard } from "./budget-term";
import { daysFrom } from "./calendar-days";
import { pairUncertaintyFromClassK } from "./pair-from-class";
import type { BathCheckEvidence, ProbePairEvidence } from "./point-evidence";

/** Taken for both pipes where no temperature is known: only the class limits depend on it. */
const ASSUMED_C = 50;
const ASSUMED_DRIFT_K = 0.03;
const LEAST_DRIFT_K = 0.01;
const OLD_CHECK_FACTOR = 2;

export interface PairState {
  readonly supplyC: number;
  readonly returnC: number;
}

/** Whether the check was made with the very probes that are on the pipes, in whichever order. */
export function checkIsOfProbes(check: BathCheckEvidence, probes: ProbePairEvidence): boolean {
  const installed = [probes.supply.serial, probes.return.serial];
  return (
    check.firstSerial !== check.secondSerial &&
    installed.includes(check.firstSerial) &&
    installed.includes(check.secondSerial)
  );
}

/**
 * What the probe pair leaves in ΔT, K.
 *
 * With a bath check of these probes: its residual (standard), and ± the drift between two checks, at
 * least 0.01 K and 0.03 K where there is one check only, twice that past 30 days (rectangular; these
 * widths are common practice). A mean difference that was not put right in the readings stays in
 * them: u² = residual² + mean² (after JCGM 100, F.2.4.5). Fewer than ten pairs widen the residual by
 * Student's t; of a mean above 0.3 K a tenth stays open. Without a check: the class limits of both
 * probes at their temperatures, class B where unknown; no drift, as the limits hold whatever the age.
 *
 * Example: residual 0.030 K and ±0.03 K at ΔT 5.9 K → 0.508475 and 0.293568 %; two unchecked class B
 * probes at 6.9 and 12.8 °C → 0.285416 K, 4.83755 %.
 */
export function pairTerms(
  probes: ProbePairEvidence | null,
  check: BathCheckEvidence | null,
  differenceCorrected: boolean,
  state: PairState | null,
  onDate: string,
): BudgetTerm[] {
  if (probes === null || check === null || !checkIsOfProbes(check, probes)) {
    return [classTerm(probes, state)];
  }
  return [checkedPairTerm(check, differenceCorrected), pairDriftTerm(check, onDate)];
}

function classTerm(probes: ProbePairEvidence | null, state: PairState | null): BudgetTerm {
  const supplyClass = probes?.supply.probeClass ?? "B";
  const returnClass = probes?.return.probeClass ?? "B";
  const known = probes?.supply.probeClass != null && probes.return.probeClass != null;
  const supplyC = state?.supplyC ?? ASSUMED_C;
  const returnC = state?.returnC ?? ASSUMED_C;
  const uncertaintyK = pairUncertaintyFromClassK(
    { probeClass: supplyClass, temperatureC: supplyC },
    { probeClass: returnClass, temperatureC: returnC },
  );
  const values = { supplyClass, returnClass, supplyC, returnC };
  return budgetTerm(
    "probePair",
    standard(uncertaintyK, "K"),
    known
      ? originOf("evidence", "pairFromClass", values)
      : originOf("default", "pairClassAssumed", values),
  );
}

/**
 * Two-sided 95.45 % quantile of Student's t with n − 1 degrees of freedom, for n = 2 … 9 pairs: over
 * 2 it says how much wider a spread seen so seldom must be taken (JCGM 100, table G.2).
 */
const STUDENT = [13.97, 4.53, 3.31, 2.87, 2.65, 2.52, 2.43, 2.37];
/** A pair far apart is not trusted to stay so at other temperatures: a tenth of it is open. */
const OPEN_SHARE = 0.1;

function checkedPairTerm(check: BathCheckEvidence, differenceCorrected: boolean): BudgetTerm {
  const { firstSerial, secondSerial, checkedOn, pairs, meanDifferenceK } = check;
  const studentFactor = (STUDENT[Math.max(2, pairs) - 2] ?? 2) / 2;
  const residualK = studentFactor * check.residualK;
  const large = exceedsK(meanDifferenceK, MEAN_LIMIT_K);
  const values = { firstSerial, secondSerial, checkedOn, residualK: check.residualK };
  if (!differenceCorrected) {
    return budgetTerm(
      "probePair",
      standard(Math.hypot(residualK, meanDifferenceK), "K"),
      originOf("evidence", "pairNotCorrected", { ...values, meanDifferenceK }),
    );
  }
  if (large) {
    return budgetTerm(
      "probePair",
      standard(Math.hypot(residualK, OPEN_SHARE * meanDifferenceK), "K"),
      originOf("evidence", "pairLargeDifference", { ...values, meanDifferenceK }),
    );
  }
  return studentFactor > 1
    ? budgetTerm(
        "probePair",
        standard(residualK, "K"),
        originOf("evidence", "pairFewReadings", { ...values, pairs, factor: studentFactor }),
      )
    : budgetTerm(
        "probePair",
        standard(residualK, "K"),
        originOf("evidence", "pairFromBath", values),
      );
}

function pairDriftTerm(check: BathCheckEvidence, onDate: string): BudgetTerm {
  const { driftK, checkedOn } = check;
  const young = driftK === null ? ASSUMED_DRIFT_K : Math.max(LEAST_DRIFT_K, Math.abs(driftK));
  const days = Math.abs(daysFrom(checkedOn, onDate));
  if (days > BATH_CHECK_DAYS) {
    const width = OLD_CHECK_FACTOR * young;
    return budgetTerm(
      "pairDrift",
      halfWidth(width, "K"),
      originOf("evidence", "pairDriftOldCheck", { checkedOn, days, halfWidthK: width }),
    );
  }
  return budgetTerm(
    "pairDrift",
    halfWidth(young, "K"),
    driftK === null
      ? originOf("default", "pairDriftAssumed", { halfWidthK: young })
      : originOf("evidence", "pairDriftMeasured", { driftK, halfWidthK: young }),
  );
}
