import type { AgreementCode } from "./codes";

/** One side of a comparison, with its expanded uncertainty (k = 2) in the same unit; null where unknown. */
export interface Compared {
  readonly value: number;
  readonly expanded: number | null;
}

export interface Agreement {
  /** First − second. */
  readonly difference: number;
  /** Of the second, %; null where that is 0. */
  readonly differencePercent: number | null;
  /** E_n; null where an uncertainty is missing or both are 0. */
  readonly en: number | null;
  readonly code: AgreementCode;
  readonly ratio: Ratio | null;
}

/** First ÷ second with its interval. */
export interface Ratio {
  readonly value: number;
  /** Expanded, k = 2; null where an uncertainty is missing. */
  readonly expanded: number | null;
}

/**
 * Whether two figures agree within what they claim: E_n = (x − X)/√(U_x² + U_X²) with *expanded*
 * uncertainties; |E_n| ≤ 1 agrees (ISO 13528). The two must be independent: figures that share an
 * instrument belong in `difference`.
 *
 * Without both uncertainties nothing is decided. The ratio's interval is first order:
 * U(r) = |r|·√((U_x/x)² + (U_X/X)²), JCGM 100, 5.1.6.
 * Example: 2511.6 ± 140.6496 against 2427.0 ± 103.6852 kWh → E_n 0.484157, agree.
 */
export function agreement(first: Compared, second: Compared): Agreement {
  const difference = first.value - second.value;
  const en = normalisedError(difference, first.expanded, second.expanded);
  return {
    difference,
    differencePercent: second.value === 0 ? null : (100 * difference) / second.value,
    en,
    code: en === null ? "inconclusive" : Math.abs(en) <= 1 ? "agree" : "disagree",
    ratio: ratioOf(first, second),
  };
}

/** E_n alone. Example: 1.006 ± 0.009 against 1.000 ± 0.0123323 → 0.393. */
export function normalisedError(
  difference: number,
  expanded: number | null,
  referenceExpanded: number | null,
): number | null {
  if (expanded === null || referenceExpanded === null) return null;
  const both = Math.hypot(expanded, referenceExpanded);
  return both > 0 ? difference / both : null;
}

function ratioOf(first: Compared, second: Compared): Ratio | null {
  if (second.value === 0) return null;
  const value = first.value / second.value;
  if (first.expanded === null || second.expanded === null) return { value, expanded: null };
  // Written without a division by the first value, which may be 0.
  const expanded = Math.hypot(first.expanded, value * second.expanded) / Math.abs(second.value);
  return { value, expanded };
}
