import { COVERAGE_FACTOR } from "./combine-terms";
import { standardFromHalfWidth } from "./distributions";

export type MeterClass = 1 | 2 | 3;

/** A permanent heat meter and the state its limits are asked for. */
export interface MeterLimitState {
  readonly meterClass: MeterClass;
  /** Flow over the meter's permanent flow q_p, > 0. */
  readonly flowRatio: number;
  readonly deltaTK: number;
  /** Least ΔT the meter is made for, K: usually 3. */
  readonly deltaTMinK: number;
  /** Most the flow part may be, %: 5, or for class 1 in some editions 3.5. */
  readonly flowCapPercent?: number;
}

export interface MeterLimits {
  readonly flowPercent: number;
  readonly pairPercent: number;
  readonly calculatorPercent: number;
  /** The arithmetic sum, as the structure E = E_f + E_t + E_c has it. */
  readonly totalPercent: number;
}

/** The flow part's two numbers: fixed, and per q_p/q. */
const FLOW: Readonly<Record<MeterClass, readonly [fixed: number, perRatio: number]>> = {
  1: [1, 0.01],
  2: [2, 0.02],
  3: [3, 0.05],
};

/** In all editions; 3.5 % for class 1 in some. */
export const FLOW_CAP_PERCENT = 5;

/**
 * Maximum permissible error of a heat meter, ±% of energy: E = E_f + E_t + E_c for classes 1 to 3.
 *
 * E_f = 1 + 0.01·q_p/q, 2 + 0.02·q_p/q, 3 + 0.05·q_p/q, at most the cap; E_t = 0.5 + 3·Δθ_min/Δθ;
 * E_c = 0.5 + Δθ_min/Δθ. Structure after Directive 2014/32/EU, Annex VI, points 1 to 3; the formulas
 * after EN 1434-1, from memory. They hold from q_i to q_s and from Δθ_min on; null outside what can
 * be put (no flow, no ΔT). Example: class 2 at 0.42 q_p, 18.4 K, Δθ_min 3 K → 2.047619 + 0.989130 +
 * 0.663043 = 3.699793 %.
 */
export function meterLimits(state: MeterLimitState): MeterLimits | null {
  const { flowRatio, deltaTK, deltaTMinK } = state;
  if (!(flowRatio > 0) || !(Math.abs(deltaTK) > 0) || !(deltaTMinK > 0)) return null;
  const [fixed, perRatio] = FLOW[state.meterClass];
  const small = deltaTMinK / Math.abs(deltaTK);
  const flowPercent = Math.min(
    fixed + perRatio / flowRatio,
    state.flowCapPercent ?? FLOW_CAP_PERCENT,
  );
  const pairPercent = 0.5 + 3 * small;
  const calculatorPercent = 0.5 + small;
  return {
    flowPercent,
    pairPercent,
    calculatorPercent,
    totalPercent: flowPercent + pairPercent + calculatorPercent,
  };
}

/**
 * Expanded uncertainty of a meter known by its limits alone, %: the limits are the half-width of a
 * rectangle, U = 2·MPE/√3. Example: 3.699793 % → 4.272153 %.
 */
export function expandedFromLimitsPercent(limits: MeterLimits): number {
  return COVERAGE_FACTOR * standardFromHalfWidth(limits.totalPercent);
}
