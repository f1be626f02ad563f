import type { Budget } from "./budget";
import { budgetTerm, expanded, halfWidth, originOf } from "./budget-term";
import { meterLimits, type MeterClass, type MeterLimits } from "./meter-limits";
import { editedTerms } from "./term-edits";
import type { TermEdit } from "./point-evidence";

/** What the plate of a permanent heat meter says, and its own certificate if there is one. */
export interface MeterPlate {
  readonly accuracyClass: MeterClass;
  /** q_p, the greatest flow the meter runs at without end, m³/h; null where nobody noted it. */
  readonly permanentFlowM3PerHour: number | null;
  /** Least ΔT the meter is made for, K. */
  readonly minimumDeltaTK: number | null;
  /** Of this very meter, of its energy; counts before the class. */
  readonly certificate: MeterCertificate | null;
}

export interface MeterCertificate {
  readonly number: string;
  readonly expandedPercent: number;
  readonly k: number;
}

/** The state the limits of a meter are put to where it logs power or energy and nothing else. */
export interface LeastState {
  /** Flow over q_p. */
  readonly flowRatio: number;
  /** Δθ over the meter's least ΔT, ≥ 1. */
  readonly deltaTRatio: number;
  /** How ΔT was bounded: by power and q_p, or not at all. */
  readonly deltaTFrom: "powerAndPermanentFlow" | "least";
}

/** Directive 2014/32/EU, Annex VI: q_p is at least ten times the least flow q_i of any meter. */
const LEAST_FLOW_RATIO = 0.1;

/** Above ρ·c of water at any temperature it is liquid at, and of every glycol mixture, kWh/(m³·K). */
const HIGHEST_KWH_PER_M3_K = 1.175;

/**
 * The worst state a meter that logs no flow and no ΔT may have been in, within what it is made for.
 *
 * Flow: a tenth of q_p, where the flow limit is wide. ΔT: the least the meter is made for, unless the
 * mean power while it ran bounds it from below: flow is q_p at most, so Δθ ≥ P/(k·q_p), and the mean
 * of 1/Δθ weighted by energy is k·q_p/P̄ at most. Both limits are then on the wide side, together more
 * than any one state has. Example: 150 kW, q_p 10 m³/h, Δθ_min 3 K → Δθ ≥ 150/(1.175·10) = 12.766 K,
 * 4.25532 times Δθ_min.
 *
 * @param meanPowerKw over the time the register ran; null where it did not.
 */
export function leastState(plate: MeterPlate, meanPowerKw: number | null): LeastState {
  const { permanentFlowM3PerHour: most, minimumDeltaTK } = plate;
  if (most !== null && minimumDeltaTK !== null && meanPowerKw !== null && meanPowerKw > 0) {
    const deltaTRatio = meanPowerKw / (HIGHEST_KWH_PER_M3_K * most) / minimumDeltaTK;
    if (deltaTRatio > 1)
      return { flowRatio: LEAST_FLOW_RATIO, deltaTRatio, deltaTFrom: "powerAndPermanentFlow" };
  }
  return { flowRatio: LEAST_FLOW_RATIO, deltaTRatio: 1, deltaTFrom: "least" };
}

/** Limits of a plate's class at the state above. */
export function limitsOfPlate(plate: MeterPlate, { flowRatio, deltaTRatio }: LeastState) {
  const at = { meterClass: plate.accuracyClass, flowRatio, deltaTK: deltaTRatio, deltaTMinK: 1 };
  const limits = meterLimits(at);
  if (limits === null) throw new Error("a least state has flow and ΔT");
  return limits;
}

/**
 * A permanent meter's budget: its certificate, else the limits of its class at the least state. One
 * term, the half-width of a rectangle, because E = E_f + E_t + E_c is a plain sum of what flow sensor,
 * temperature pair and calculator may err by (EN 1434-1; Directive 2014/32/EU, Annex VI).
 * Example: class 2 with nothing else known → 2.2 + 3.5 + 1.5 = 7.2 %, U = 2·7.2/√3 = 8.313844 %.
 */
export function budgetFromPlate(
  plate: MeterPlate,
  meanPowerKw: number | null,
  edits: readonly TermEdit[],
): Budget {
  const { certificate } = plate;
  if (certificate !== null) {
    const { number, expandedPercent, k } = certificate;
    const origin = originOf("evidence", "meterOwnCertificate", { number, expandedPercent, k });
    return budgetOfTerm(
      budgetTerm("meterLimits", expanded(expandedPercent, "%", k), origin),
      edits,
    );
  }
  const state = leastState(plate, meanPowerKw);
  return budgetFromMeterLimits(plate, limitsOfPlate(plate, state), state, edits);
}

/** The limits as a budget, so that a permanent meter's figures combine like any other's. */
export function budgetFromMeterLimits(
  { accuracyClass: meterClass, minimumDeltaTK }: MeterPlate,
  { flowPercent, pairPercent, calculatorPercent, totalPercent }: MeterLimits,
  { deltaTFrom, deltaTRatio }: LeastState,
  edits: readonly TermEdit[],
): Budget {
  const parts = { meterClass, flowPercent, pairPercent, calculatorPercent, totalPercent };
  const origin =
    deltaTFrom === "least" || minimumDeltaTK === null
      ? originOf("evidence", "meterClassLeastState", parts)
      : originOf("evidence", "meterClassByPower", {
          ...parts,
          leastDeltaTK: deltaTRatio * minimumDeltaTK,
        });
  return budgetOfTerm(budgetTerm("meterLimits", halfWidth(totalPercent, "%"), origin), edits);
}

function budgetOfTerm(term: Budget["terms"][number], edits: readonly TermEdit[]): Budget {
  const own = edits.filter(({ kind }) => kind === term.kind);
  return { terms: editedTerms([term], own), boreMm: null, autocorrelation: 0 };
}
