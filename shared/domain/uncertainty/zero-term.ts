import type { BudgetTerm } from "./budget";
import { budgetTerm, halfWidth, originOf } from "./budget-term";
import type { ZeroEvidence } from "./point-evidence";

/**
 * What the meter's zero leaves, a half-width in m/s, rectangular.
 *
 * Flow proven stopped: what remained after the zero was set or corrected; a reading nobody dealt with
 * stays as wide as it is. Otherwise at least ±0.010 m/s, because a zero on a flowing pipe proves
 * nothing. Without a bore no speed can be told from the flow, so the same width is put to a slow
 * 0.5 m/s. The ±0.010 m/s and the 0.5 m/s are common practice without a source.
 *
 * Example: ±0.010 m/s at 0.960771 m/s → 0.600924 % of flow.
 */
export const UNPROVEN_ZERO_M_PER_S = 0.01;
const SLOW_M_PER_S = 0.5;

export function zeroTerm(zero: ZeroEvidence | null, boreKnown: boolean): BudgetTerm {
  const { widthMPerS, from, code } = zeroLeft(zero);
  if (!boreKnown) {
    const percent = (100 * widthMPerS) / SLOW_M_PER_S;
    return budgetTerm(
      "zero",
      halfWidth(percent, "%"),
      originOf(from, "zeroWithoutBore", {
        halfWidthMPerS: widthMPerS,
        speedMPerS: SLOW_M_PER_S,
        halfWidthPercent: percent,
      }),
    );
  }
  const origin =
    code === "zeroReadingLeft"
      ? originOf(from, code, { readingMPerS: zero?.readingMPerS ?? 0, halfWidthMPerS: widthMPerS })
      : originOf(from, code, { halfWidthMPerS: widthMPerS });
  return budgetTerm("zero", halfWidth(widthMPerS, "m/s"), origin);
}

interface ZeroLeft {
  readonly widthMPerS: number;
  readonly from: "evidence" | "default";
  readonly code: "zeroSet" | "zeroReadingLeft" | "zeroUnproven";
}

/** How the zero stands: proven and dealt with, proven and left, or unproven. */
export function zeroLeft(zero: ZeroEvidence | null): ZeroLeft {
  const remaining = zero?.remainingMPerS ?? null;
  if (zero?.flowStopped !== true) {
    return {
      widthMPerS: Math.max(UNPROVEN_ZERO_M_PER_S, remaining ?? 0),
      from: "default",
      code: "zeroUnproven",
    };
  }
  const reading = zero.readingMPerS;
  if (zero.action === "none" && reading !== null) {
    return {
      widthMPerS: Math.max(Math.abs(reading), remaining ?? UNPROVEN_ZERO_M_PER_S),
      from: "evidence",
      code: "zeroReadingLeft",
    };
  }
  return remaining === null
    ? { widthMPerS: UNPROVEN_ZERO_M_PER_S, from: "default", code: "zeroUnproven" }
    : { widthMPerS: remaining, from: "evidence", code: "zeroSet" };
}
