import type { Gap } from "./repair-step";

/** Steps longer than this many nominal ones are gaps: energy leaves them as holes. */
export const GAP_STEPS = 3;
const SAMPLED_STEPS = 20_001;

/** The usual step between rows, ms: the median of steps from across the file; null with fewer than two rows. */
export function nominalStepMs(instantMs: Float64Array): number | null {
  const count = instantMs.length - 1;
  if (count < 1) return null;
  const taken = Math.min(count, SAMPLED_STEPS);
  const steps = new Float64Array(taken);
  for (let k = 0; k < taken; k++) {
    const i = Math.floor((k * count) / taken);
    steps[k] = (instantMs[i + 1] as number) - (instantMs[i] as number);
  }
  steps.sort();
  return steps[taken >> 1] as number;
}

/** Every stretch without rows, in order of time. @param flowM3PerHour may hold NaN; null if the file has no flow */
export function findGaps(
  instantMs: Float64Array,
  flowM3PerHour: Float64Array | null,
  stepMs: number,
): readonly Gap[] {
  const gaps: Gap[] = [];
  for (let i = 1; i < instantMs.length; i++) {
    const fromMs = instantMs[i - 1] as number;
    const toMs = instantMs[i] as number;
    if (toMs - fromMs <= GAP_STEPS * stepMs) continue;
    gaps.push({
      fromMs,
      toMs,
      missingRows: Math.round((toMs - fromMs) / stepMs) - 1,
      flowBeforeM3PerHour: known(flowM3PerHour?.[i - 1]),
      flowAfterM3PerHour: known(flowM3PerHour?.[i]),
    });
  }
  return gaps;
}

function known(value: number | undefined): number | null {
  return value === undefined || Number.isNaN(value) ? null : value;
}
