import type { BudgetTerm } from "./budget";
import { budgetTerm, originOf, standard } from "./budget-term";
import type { ClockEvidence, PointEvidence } from "./point-evidence";

/*
 * Where nothing is on record; common practice without a source. The steps are those of ordinary
 * loggers, the noise is on the wide side of what survey logs show.
 */
const FLOW_NOISE_PERCENT = 1;
const FLOW_STEP_L_PER_S = 0.01;
const DELTA_T_NOISE_K = 0.03;
const DELTA_T_STEP_K = 0.1;
const ALIGNMENT_PERCENT = 0.3;
/** Neighbouring readings resemble each other; unknown, a third of them is taken to be news. */
export const ASSUMED_AUTOCORRELATION = 0.5;

type Noise = Pick<PointEvidence, "noise" | "flowMeter" | "probes" | "clocks">;

/**
 * What averages out with time: noise, logger steps and the alignment of flow with temperatures.
 *
 * Noise as measured (standard), steps as whole steps, alignment 0.3 % of heat, more where a logger's
 * clock was off by more than half an interval: 0.3 % · offset ÷ (½ interval).
 * Example: 0.8 %, 0.01 L/s, 0.02 K, 0.01 K at 8 L/s and 5.9 K → 0.8, 0.0360844, 0.338983, 0.0691946 %.
 */
export function randomTerms(evidence: Noise | null, intervalS: number | null): BudgetTerm[] {
  const flowNoise = evidence?.noise?.flowPercent ?? null;
  const flowStep = evidence?.flowMeter?.stepLPerS ?? null;
  const deltaTNoise = evidence?.noise?.deltaTK ?? null;
  const deltaTStep = evidence?.probes?.stepK ?? null;
  return [
    budgetTerm(
      "flowNoise",
      standard(flowNoise ?? FLOW_NOISE_PERCENT, "%"),
      flowNoise === null
        ? originOf("default", "flowNoiseAssumed", { percent: FLOW_NOISE_PERCENT })
        : originOf("evidence", "flowNoiseMeasured", { percent: flowNoise }),
    ),
    budgetTerm(
      "flowStep",
      { given: flowStep ?? FLOW_STEP_L_PER_S, unit: "L/s", distribution: "rectangular", k: null },
      flowStep === null
        ? originOf("default", "flowStepAssumed", { stepLPerS: FLOW_STEP_L_PER_S })
        : originOf("evidence", "flowStepStated", { stepLPerS: flowStep }),
    ),
    budgetTerm(
      "deltaTNoise",
      standard(deltaTNoise ?? DELTA_T_NOISE_K, "K"),
      deltaTNoise === null
        ? originOf("default", "deltaTNoiseAssumed", { standardK: DELTA_T_NOISE_K })
        : originOf("evidence", "deltaTNoiseMeasured", { standardK: deltaTNoise }),
    ),
    budgetTerm(
      "deltaTStep",
      { given: deltaTStep ?? DELTA_T_STEP_K, unit: "K", distribution: "rectangular", k: null },
      deltaTStep === null
        ? originOf("default", "deltaTStepAssumed", { stepK: DELTA_T_STEP_K })
        : originOf("evidence", "deltaTStepStated", { stepK: deltaTStep }),
    ),
    alignmentTerm(evidence?.clocks ?? [], intervalS),
  ];
}

/** Greatest distance of any logger from the reference clock, s; null where nobody looked. */
export function worstClockOffsetS(clocks: readonly ClockEvidence[]): number | null {
  const offsets = clocks
    .flatMap((clock) => [clock.startOffsetS, clock.endOffsetS])
    .filter((offset) => offset !== null);
  return offsets.length === 0 ? null : Math.max(...offsets.map(Math.abs));
}

function alignmentTerm(clocks: readonly ClockEvidence[], intervalS: number | null): BudgetTerm {
  const offsetS = worstClockOffsetS(clocks);
  if (offsetS !== null && intervalS !== null && intervalS > 0 && offsetS > intervalS / 2) {
    const percent = ALIGNMENT_PERCENT * (offsetS / (intervalS / 2));
    return budgetTerm(
      "alignment",
      standard(percent, "%"),
      originOf("evidence", "alignmentClockError", { offsetS, intervalS, percent }),
    );
  }
  return budgetTerm(
    "alignment",
    standard(ALIGNMENT_PERCENT, "%"),
    originOf("default", "alignmentAssumed", { percent: ALIGNMENT_PERCENT }),
  );
}
