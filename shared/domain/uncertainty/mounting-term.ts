import type { BudgetTerm } from "./budget";
import { budgetTerm, halfWidth, originOf } from "./budget-term";
import type { ProbePairEvidence } from "./point-evidence";

export type MountingKind = "pockets" | "surface" | "unequal" | "uninsulated" | "unknown";

/** How the pair sits: equal mounting makes much of the error common, unequal does not cancel. */
export function mountingKind(probes: ProbePairEvidence | null): MountingKind {
  if (probes === null) return "unknown";
  const both = [probes.supply, probes.return];
  if (both.some((probe) => probe.mounting === "surface" && !probe.insulated)) return "uninsulated";
  if (probes.supply.mounting !== probes.return.mounting) return "unequal";
  return probes.supply.mounting === "pocket" ? "pockets" : "surface";
}

/** Half-widths in K; common practice without a source. */
const ASSUMED = {
  pockets: { widthK: 0.05, code: "mountingPockets", from: "evidence" },
  surface: { widthK: 0.1, code: "mountingSurface", from: "evidence" },
  unequal: { widthK: 0.3, code: "mountingUnequal", from: "evidence" },
  uninsulated: { widthK: 0.5, code: "mountingUninsulated", from: "evidence" },
  unknown: { widthK: 0.3, code: "mountingUnknown", from: "default" },
} as const;

/**
 * What mounting adds to ΔT, ±K, rectangular: as stated, else by how the probes sit. Unequal mounting
 * and bare surface probes are never narrower than ±0.3 and ±0.5 K, whatever was stated; an edit of
 * the term may say otherwise. Example: ±0.10 K at ΔT 5.9 K → 0.978560 %.
 */
export function mountingTerm(probes: ProbePairEvidence | null): BudgetTerm {
  const kind = mountingKind(probes);
  const { widthK, code, from } = ASSUMED[kind];
  const stated = probes?.mountingK ?? null;
  const doubtful = kind === "unequal" || kind === "uninsulated";
  if (stated === null || (doubtful && stated < widthK)) {
    return budgetTerm(
      "mounting",
      halfWidth(widthK, "K"),
      originOf(from, code, { halfWidthK: widthK }),
    );
  }
  return budgetTerm(
    "mounting",
    halfWidth(stated, "K"),
    originOf("evidence", "mountingStated", { halfWidthK: stated }),
  );
}
