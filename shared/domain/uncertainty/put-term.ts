import { FLOW_SENSITIVITY_TO_BORE } from "../pipes/bore-uncertainty";
import type { BudgetTerm } from "./budget";

/** The state a term is put to; null where it is not known. Signs do not matter. */
export interface TermState {
  readonly flowM3PerHour: number | null;
  readonly velocityMPerS: number | null;
  readonly deltaTK: number | null;
  readonly boreMm: number | null;
}

/**
 * Standard uncertainty of a term relative to its own quantity, %: K over ΔT, m/s over speed, L/s over
 * flow, and a bore twice over, because flow goes with its square. As P = q·ρ·Δh is a product, the same
 * percentage holds for power (JCGM 100, 5.1.6). Null where the state is not known or nothing moves.
 * Example: 0.030 K at ΔT 5.9 K → 0.508475 %.
 */
export function percentOfTerm(term: BudgetTerm, state: TermState): number | null {
  switch (term.unit) {
    case "%":
      return term.standard;
    case "K":
      return share(term.standard, state.deltaTK);
    case "m/s":
      return share(term.standard, state.velocityMPerS);
    case "L/s":
      return share(term.standard, state.flowM3PerHour === null ? null : state.flowM3PerHour / 3.6);
    case "mm": {
      const ofBore = share(term.standard, state.boreMm);
      return ofBore === null ? null : FLOW_SENSITIVITY_TO_BORE * ofBore;
    }
  }
}

function share(standard: number, whole: number | null): number | null {
  if (standard === 0) return 0;
  return whole === null || !(Math.abs(whole) > 0) ? null : (100 * standard) / Math.abs(whole);
}
