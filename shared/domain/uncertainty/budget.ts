import type { BudgetTermKind } from "./point-evidence";

/**
 * An uncertainty budget as a list of terms, before it is put to a state or a period.
 *
 * A systematic term keeps its size however long one measures; a random one shrinks with the
 * effective number of samples. Terms act on flow, on ΔT or on heat as a whole; combination is in
 * `combine-interval` and `combine-period`.
 */
export interface Budget {
  readonly terms: readonly BudgetTerm[];
  /** Bore in mm that turns speeds into flow; null where unknown, then speed terms cannot be put. */
  readonly boreMm: number | null;
  /** Lag-one autocorrelation of the random terms. */
  readonly autocorrelation: number;
}

export interface BudgetTerm {
  readonly kind: BudgetTermKind;
  readonly nature: "systematic" | "random";
  readonly actsOn: "flow" | "deltaT" | "heat";
  /** As given: a half-width, an expanded value or a standard uncertainty, in `unit`. */
  readonly given: number;
  readonly unit: "%" | "K" | "m/s" | "mm" | "L/s";
  readonly distribution: "normal" | "rectangular" | "standard";
  /** For `normal`: the coverage factor of `given`. */
  readonly k: number | null;
  /** Standard uncertainty in `unit`. */
  readonly standard: number;
  readonly origin: TermOrigin;
}

/** Why a term has its size. `code` is stable and screens have the words; `values` fill them. */
export interface TermOrigin {
  readonly from: "evidence" | "default" | "edited";
  readonly code: string;
  readonly values: Readonly<Record<string, string | number>>;
}

/** One term put to a state or a period. */
export interface CombinedTerm {
  readonly term: BudgetTerm;
  /** Standard uncertainty relative to the figure, %, after random terms have shrunk. */
  readonly percent: number;
  /** The same in the figure's own unit. */
  readonly absolute: number;
}

export interface CombinedUncertainty {
  /** Largest first. */
  readonly terms: readonly CombinedTerm[];
  readonly systematicPercent: number;
  readonly randomPercent: number;
  readonly combinedPercent: number;
  readonly k: number;
  readonly expandedPercent: number;
  /** In the figure's own unit, ≥ 0. */
  readonly expanded: number;
  readonly samples: number;
  readonly effectiveSamples: number;
}
