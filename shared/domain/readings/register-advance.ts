/** Two reads of one register by eye or photograph, in the register's own unit. */
export interface RegisterReads {
  readonly opening: number;
  readonly closing: number;
  /** What one unit of the display stands for, such as 10 for a "× 10" plate. */
  readonly multiplier: number;
  /** Places before the decimal mark; null where nobody said. */
  readonly digits: number | null;
  /** Whether somebody says that the register passed its highest read once in between. */
  readonly rolledOver: boolean;
}

export const REGISTER_PROBLEMS = [
  "closingBelowOpening",
  "digitsNeeded",
  "moreThanDigits",
  "didNotRollOver",
] as const;
/** Why two reads give no difference; a screen says what to do about each. */
export type RegisterProblem = (typeof REGISTER_PROBLEMS)[number];

export type RegisterAdvance =
  | { readonly ok: true; readonly advance: number }
  | { readonly ok: false; readonly problem: RegisterProblem };

/**
 * What passed between two reads, in the register's unit: (closing − opening) × multiplier, and after
 * one rollover (closing + 10^digits − opening) × multiplier.
 *
 * A closing read below the opening one may be a rollover, an exchanged meter or a misread digit; the
 * size of the difference tells nothing about which, so it is never used: somebody has to say that the
 * register rolled over, and how many digits it has. Valid for reads ≥ 0 and a multiplier > 0.
 * Example: 184632.0 to 187059.0 × 1 → 2427; 99 640 to 318 with five digits, rolled over → 678.
 */
export function registerAdvance(reads: RegisterReads): RegisterAdvance {
  const { opening, closing, multiplier, digits, rolledOver } = reads;
  const capacity = digits === null ? null : 10 ** digits;
  if (capacity !== null && (opening >= capacity || closing >= capacity))
    return { ok: false, problem: "moreThanDigits" };
  if (!rolledOver) {
    if (closing < opening) return { ok: false, problem: "closingBelowOpening" };
    return { ok: true, advance: (closing - opening) * multiplier };
  }
  if (capacity === null) return { ok: false, problem: "digitsNeeded" };
  if (closing >= opening) return { ok: false, problem: "didNotRollOver" };
  return { ok: true, advance: (closing + capacity - opening) * multiplier };
}
