import type { BudgetTerm } from "./budget";
import { budgetTerm, expanded, halfWidth, originOf } from "./budget-term";
import type { CertificateEvidence, FlowMeterEvidence } from "./point-evidence";

/**
 * What the flow meter's calibration leaves: the certificate itself and the drift since.
 *
 * In date: U and k of the certificate. Lapsed: twice that U. None: U = 4 % (k = 2), what a clamp-on
 * meter out of its box may well miss. Drift as stated, else ±1 %, rectangular. The factor, the 4 %
 * and the 1 % are common practice without a source. A certificate counts through its due day; one
 * without a due day does not lapse. Example: U = 1.0 %, k = 2 → 0.5 %; drift ±0.5 % → 0.288675 %.
 */
export function certificateTerms(meter: FlowMeterEvidence | null, onDate: string): BudgetTerm[] {
  return [certificateTerm(meter, onDate), driftTerm(meter)];
}

export const LAPSED_FACTOR = 2;
const MISSING_PERCENT = 4;
const ASSUMED_DRIFT_PERCENT = 1;

export function certificateLapsed(certificate: CertificateEvidence, onDate: string): boolean {
  return certificate.dueOn !== null && certificate.dueOn < onDate;
}

function certificateTerm(meter: FlowMeterEvidence | null, onDate: string): BudgetTerm {
  const certificate = meter?.certificate ?? null;
  if (meter === null || certificate === null) {
    return budgetTerm(
      "certificate",
      expanded(MISSING_PERCENT, "%", 2),
      originOf("default", "certificateMissing", { expandedPercent: MISSING_PERCENT, k: 2 }),
    );
  }
  const { number, k, issuedOn, dueOn } = certificate;
  const named = { serial: meter.serial, number, expandedPercent: certificate.expanded, k };
  if (dueOn !== null && certificateLapsed(certificate, onDate)) {
    return budgetTerm(
      "certificate",
      expanded(LAPSED_FACTOR * certificate.expanded, "%", k),
      originOf("evidence", "certificateLapsed", { ...named, dueOn, factor: LAPSED_FACTOR }),
    );
  }
  return budgetTerm(
    "certificate",
    expanded(certificate.expanded, "%", k),
    originOf("evidence", "certificateInDate", { ...named, issuedOn }),
  );
}

function driftTerm(meter: FlowMeterEvidence | null): BudgetTerm {
  const stated = meter?.driftPercent ?? null;
  return meter !== null && stated !== null
    ? budgetTerm(
        "drift",
        halfWidth(stated, "%"),
        originOf("evidence", "driftStated", { serial: meter.serial, halfWidthPercent: stated }),
      )
    : budgetTerm(
        "drift",
        halfWidth(ASSUMED_DRIFT_PERCENT, "%"),
        originOf("default", "driftAssumed", { halfWidthPercent: ASSUMED_DRIFT_PERCENT }),
      );
}
