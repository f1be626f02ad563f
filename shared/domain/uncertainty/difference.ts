import type { CombinedTerm, CombinedUncertainty } from "./budget";
import { COVERAGE_FACTOR } from "./combine-terms";
import type { BudgetTermKind } from "./point-evidence";

/** A figure and how it is known, as `combinePeriod` gives it. */
export interface UncertainValue {
  readonly value: number;
  readonly combined: CombinedUncertainty;
}

/** Which systematic kinds are one and the same error in both figures; "all" for one installation. */
export type SharedKinds = "all" | ReadonlySet<BudgetTermKind>;

export interface DifferenceUncertainty {
  readonly difference: number;
  /** Standard and expanded (k = 2), in the figures' unit. */
  readonly standard: number;
  readonly expanded: number;
}

export interface RatioUncertainty {
  readonly ratio: number;
  readonly standard: number;
  readonly expanded: number;
}

/**
 * Uncertainty of a difference a − b of two figures, such as two weeks of one loop (JCGM 100, 5.2.2
 * with r = 1 for what is shared): a shared error moves both figures the same way and leaves
 * |u_a − u_b| of itself; everything else, random terms among it, adds as root of the sum of squares.
 *
 * Both figures must be of the same register: an offset of ΔT that raises heating lowers cooling.
 * Example: 1000 and 900 kWh, each 2 % systematic and shared, 0.1 % random → u = √(2² + 1² + 0.9²) =
 * 2.410 kWh; taken as independent it would be 26.94 kWh.
 */
export function differenceUncertainty(
  a: UncertainValue,
  b: UncertainValue,
  shared: SharedKinds,
): DifferenceUncertainty {
  const standard = combinedOf(a.combined, b.combined, shared, (put) => put?.absolute ?? 0);
  return { difference: a.value - b.value, standard, expanded: COVERAGE_FACTOR * standard };
}

/**
 * Uncertainty of a ratio a ÷ b: the same, with each term relative to its own figure, so that a shared
 * error of the same percentage cancels whole. Null where b is 0.
 * Example: the two weeks above → 1.1111, u = 0.1414 % of it = 0.001571.
 */
export function ratioUncertainty(
  a: UncertainValue,
  b: UncertainValue,
  shared: SharedKinds,
): RatioUncertainty | null {
  if (b.value === 0) return null;
  const ratio = a.value / b.value;
  const percent = combinedOf(a.combined, b.combined, shared, (put) => put?.percent ?? 0);
  const standard = (Math.abs(ratio) * percent) / 100;
  return { ratio, standard, expanded: COVERAGE_FACTOR * standard };
}

function combinedOf(
  a: CombinedUncertainty,
  b: CombinedUncertainty,
  shared: SharedKinds,
  size: (put: CombinedTerm | undefined) => number,
): number {
  const kinds = new Set([...a.terms, ...b.terms].map((put) => put.term.kind));
  let variance = 0;
  for (const kind of kinds) {
    const ofA = a.terms.find((put) => put.term.kind === kind);
    const ofB = b.terms.find((put) => put.term.kind === kind);
    const systematic = (ofA ?? ofB)?.term.nature === "systematic";
    const cancels = systematic && kind !== "filled" && (shared === "all" || shared.has(kind));
    variance += cancels ? (size(ofA) - size(ofB)) ** 2 : size(ofA) ** 2 + size(ofB) ** 2;
  }
  return Math.sqrt(variance);
}
