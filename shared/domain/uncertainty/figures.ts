import type { BudgetTerm } from "./budget";

/** Figures an uncertainty can be given for; power includes any mean of power, such as a night base. */
export type UncertainFigure = "energy" | "power" | "volume" | "deltaT";

/**
 * Whether a term touches a figure: heat is touched by all, volume by what acts on flow, ΔT by what
 * acts on ΔT. The term for filled time is put on apart, with its share.
 */
export function touches(term: BudgetTerm, figure: UncertainFigure): boolean {
  if (term.kind === "filled") return false;
  if (figure === "volume") return term.actsOn === "flow";
  return figure === "deltaT" ? term.actsOn === "deltaT" : true;
}
