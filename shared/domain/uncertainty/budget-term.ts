import type { BudgetTerm, TermOrigin } from "./budget";
import type { OriginCode, OriginValues } from "./codes";
import { standardFromExpanded, standardFromHalfWidth, standardFromStep } from "./distributions";
import type { BudgetTermKind } from "./point-evidence";

/** What is always so of a kind of term, whatever its size. */
export const TERM_NATURE: Readonly<Record<BudgetTermKind, Pick<BudgetTerm, "nature" | "actsOn">>> =
  {
    certificate: { nature: "systematic", actsOn: "flow" },
    drift: { nature: "systematic", actsOn: "flow" },
    zero: { nature: "systematic", actsOn: "flow" },
    bore: { nature: "systematic", actsOn: "flow" },
    profile: { nature: "systematic", actsOn: "flow" },
    remount: { nature: "systematic", actsOn: "flow" },
    density: { nature: "systematic", actsOn: "heat" },
    enthalpy: { nature: "systematic", actsOn: "heat" },
    probePair: { nature: "systematic", actsOn: "deltaT" },
    mounting: { nature: "systematic", actsOn: "deltaT" },
    pairDrift: { nature: "systematic", actsOn: "deltaT" },
    fluid: { nature: "systematic", actsOn: "heat" },
    flowNoise: { nature: "random", actsOn: "flow" },
    flowStep: { nature: "random", actsOn: "flow" },
    deltaTNoise: { nature: "random", actsOn: "deltaT" },
    deltaTStep: { nature: "random", actsOn: "deltaT" },
    alignment: { nature: "random", actsOn: "heat" },
    meterLimits: { nature: "systematic", actsOn: "heat" },
    filled: { nature: "systematic", actsOn: "heat" },
  };

type Size = Pick<BudgetTerm, "given" | "unit" | "distribution" | "k">;

/**
 * Standard uncertainty of a term as given, in its unit. A half-width becomes a/√3, an expanded value
 * U/k. Of the two logger steps `given` is the whole step: one rounded flow leaves step/√12, and ΔT,
 * a difference of two rounded temperatures, √2 of that.
 */
export function standardOfTerm(kind: BudgetTermKind, size: Size): number {
  if (kind === "flowStep") return standardFromStep(size.given);
  if (kind === "deltaTStep") return Math.SQRT2 * standardFromStep(size.given);
  switch (size.distribution) {
    case "standard":
      return size.given;
    case "rectangular":
      return standardFromHalfWidth(size.given);
    case "normal":
      return standardFromExpanded(size.given, size.k ?? 2);
  }
}

export function originOf<C extends OriginCode>(
  from: TermOrigin["from"],
  code: C,
  values: OriginValues<C>,
): TermOrigin {
  return { from, code, values };
}

export function budgetTerm(kind: BudgetTermKind, size: Size, origin: TermOrigin): BudgetTerm {
  return { kind, ...TERM_NATURE[kind], ...size, standard: standardOfTerm(kind, size), origin };
}

/** ±a, every value within as likely. */
export function halfWidth(given: number, unit: BudgetTerm["unit"]): Size {
  return { given, unit, distribution: "rectangular", k: null };
}

/** Already a standard uncertainty. */
export function standard(given: number, unit: BudgetTerm["unit"]): Size {
  return { given, unit, distribution: "standard", k: null };
}

/** U with the coverage factor printed beside it. */
export function expanded(given: number, unit: BudgetTerm["unit"], k: number): Size {
  return { given, unit, distribution: "normal", k };
}
