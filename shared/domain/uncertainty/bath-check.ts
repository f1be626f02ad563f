import { daysFrom } from "./calendar-days";
import { type ConditionVerdict, fine, widens } from "./verdict";

/** Both probes read at the same moment in one stirred bath, °C. */
export interface BathReading {
  readonly firstC: number;
  readonly secondC: number;
}

export interface BathCheckResult {
  readonly pairs: number;
  /** Mean of all readings of both probes, °C. */
  readonly bathC: number;
  /** Mean of first − second, K. */
  readonly meanDifferenceK: number;
  /** Sample deviation of the differences (n − 1), K. */
  readonly deviationK: number;
  /** Standard uncertainty of the pair once the mean is taken off, K. */
  readonly residualK: number;
  /** Change of the mean difference since the check before, K; null without one. */
  readonly driftK: number | null;
}

/** Mean difference of an earlier check of the same two probes, in the same order. */
export interface EarlierCheck {
  readonly meanDifferenceK: number;
}

/** What a check is worth a look for (common practice). */
export const LEAST_PAIRS = 10;
export const BATH_CHECK_DAYS = 30;
export const MEAN_LIMIT_K = 0.3;
export const DRIFT_LIMIT_K = 0.05;

/**
 * What a same-bath comparison of two probes says: mean difference d̄, sample deviation s, and what is
 * left once d̄ is taken off, u² = s²/n + u_bath² (JCGM 100, 4.2.3 and 5.1.2).
 *
 * `bathUncertaintyK` is the standard uncertainty the bath leaves: its gradient between the probes.
 * The difference belongs to the serial numbers, not to supply and return. Null with fewer than two
 * pairs, as a spread is then unknown. Example: 4.10/4.00, 4.12/4.00, 4.11/4.00, 4.11/4.00 °C and
 * 0.01 K → d̄ 0.11 K, s 0.00816497 K, u 0.0108012 K.
 */
export function bathCheck(
  readings: readonly BathReading[],
  bathUncertaintyK: number,
  earlier: EarlierCheck | null = null,
): BathCheckResult | null {
  const pairs = readings.length;
  if (pairs < 2) return null;
  const differences = readings.map(({ firstC, secondC }) => firstC - secondC);
  const meanDifferenceK = mean(differences);
  const squares = differences.map((difference) => (difference - meanDifferenceK) ** 2);
  const deviationK = Math.sqrt((mean(squares) * pairs) / (pairs - 1));
  return {
    pairs,
    bathC: mean(readings.map(({ firstC, secondC }) => (firstC + secondC) / 2)),
    meanDifferenceK,
    deviationK,
    residualK: Math.hypot(deviationK / Math.sqrt(pairs), bathUncertaintyK),
    driftK: earlier === null ? null : meanDifferenceK - earlier.meanDifferenceK,
  };
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** What the judgement of a check needs; the evidence of a point has it. */
export type JudgedCheck = Pick<BathCheckResult, "pairs" | "meanDifferenceK" | "driftK"> & {
  readonly checkedOn: string;
};

/**
 * Verdicts on a check: at least ten pairs, at most 30 days from the day asked about, a mean of at
 * most 0.3 K and a drift of at most 0.05 K (common practice). One `fine` where nothing is wrong.
 */
export function bathCheckVerdicts(check: JudgedCheck, onDate: string): ConditionVerdict[] {
  const { pairs, checkedOn, meanDifferenceK, driftK } = check;
  const days = Math.abs(daysFrom(checkedOn, onDate));
  const found: ConditionVerdict[] = [];
  if (pairs < LEAST_PAIRS) {
    const values = { pairs, least: LEAST_PAIRS };
    found.push(widens("bathCheck", "bathCheckFewPairs", values, "probePair"));
  }
  if (days > BATH_CHECK_DAYS) {
    const values = { checkedOn, days, most: BATH_CHECK_DAYS };
    found.push(widens("bathCheck", "bathCheckOld", values, "pairDrift"));
  }
  if (exceedsK(meanDifferenceK, MEAN_LIMIT_K)) {
    const values = { meanDifferenceK, limitK: MEAN_LIMIT_K };
    found.push(widens("bathCheck", "bathCheckMeanLarge", values, "probePair"));
  }
  if (driftK !== null && exceedsK(driftK, DRIFT_LIMIT_K)) {
    const values = { driftK, limitK: DRIFT_LIMIT_K };
    found.push(widens("bathCheck", "bathCheckDrift", values, "pairDrift"));
  }
  return found.length > 0
    ? found
    : [fine("bathCheck", "bathCheckFine", { checkedOn, pairs, meanDifferenceK })];
}

/** 0.35 − 0.30 from two readings in hundredths does not exceed 0.05. */
export function exceedsK(differenceK: number, limitK: number): boolean {
  return Math.abs(differenceK) > limitK + 1e-9;
}
