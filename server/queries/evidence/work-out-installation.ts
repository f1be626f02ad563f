import type { InstallationFields, WorkedOutInstallation } from "@shared/contracts/evidence";
import { flowAreaM2 } from "@shared/domain/pipes/bore";
import { reynoldsNumber } from "@shared/domain/pipes/reynolds-number";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { boreFromEvidence } from "@shared/domain/uncertainty/bore-from-evidence";
import { COVERAGE_FACTOR } from "@shared/domain/uncertainty/combine-terms";
import { conditionVerdicts } from "@shared/domain/uncertainty/conditions";
import { budgetFromPlate } from "@shared/domain/uncertainty/meter-plate";
import type { PointEvidence } from "@shared/domain/uncertainty/point-evidence";
import type { Instrument } from "@server/models/instrument";
import type { StandingCorrection } from "@server/readings/point-corrections";
import { bathCheckOf, evidenceOf } from "./evidence-of";
import { putRightBy } from "./corrected-already";
import type { EvidenceRecords } from "./evidence-records";
import { budgetOf, isIndicativeOnly, testedOnOf } from "./point-evidence";
import type { PointBackground } from "./point-background";
import { presentTerm, sizeBudget } from "./size-budget";
import { budgetStateOf, type BudgetState } from "./usual-state";

/**
 * What follows from an installation's fields, kept or not: bore, verdicts and budget.
 * @param corrections applied to the point's readings: what they put right is held against nobody.
 */
export function workOutInstallation(
  background: PointBackground,
  fields: InstallationFields,
  records: EvidenceRecords,
  corrections: readonly StandingCorrection[],
): WorkedOutInstallation {
  const { loop, point, site, pipe } = background;
  const startDay = localDateOf(Date.parse(fields.startsAt), site.zone);
  const evidence = evidenceOf(fields, records, startDay, testedOnOf(background));
  const measured = boreFromEvidence(evidence.pipe, null);
  const boreMm = measured?.boreMm ?? pipe?.insideDiameterMm ?? null;
  const state = budgetStateOf(loop, point.meterSide, fields, boreMm);
  const corrected = putRightBy(corrections, fields);
  const wishes = {
    onDate: startDay,
    state: state.usual,
    pairDifferenceCorrected: corrected.pairDifference,
  };
  const budget = budgetOf(background, evidence, wishes);
  const factor = flowFactorOf(measured?.boreMm ?? null, fields.enteredBoreMm);
  const { shownFlowLPerS } = fields;
  return {
    bore: measured && {
      outsideDiameterMm: measured.outsideDiameterMm,
      wallMeanMm: measured.wallMeanMm,
      wallDeviationMm: measured.wallDeviationMm,
      insideDiameterMm: measured.boreMm,
      uncertaintyMm: measured.uncertaintyMm,
      flowFactor: factor,
    },
    correctedFlowLPerS: factor === null || shownFlowLPerS === null ? null : factor * shownFlowLPerS,
    zeroLPerS: zeroFlow(fields.zero, boreMm),
    plateTerm: plateTermOf(evidence),
    boreUsedMm: boreMm,
    bathCheckUsed: evidence.bathCheck && {
      id: bathCheckOf(fields, records, startDay)?.id ?? "",
      checkedOn: evidence.bathCheck.checkedOn,
      firstSerial: evidence.bathCheck.firstSerial,
      secondSerial: evidence.bathCheck.secondSerial,
      meanDifferenceK: evidence.bathCheck.meanDifferenceK,
      residualK: evidence.bathCheck.residualK,
      driftK: evidence.bathCheck.driftK,
    },
    instruments: namesOf(fields, records),
    indicativeOnly: isIndicativeOnly(fields, records),
    verdicts: conditionVerdicts({
      evidence,
      budget,
      fluid: loop.fluid,
      state: judgedState(background, state, boreMm),
      enteredBoreMm: fields.enteredBoreMm,
      enteredBoreCorrected: corrected.enteredBore,
      onDate: startDay,
      intervalS: null,
      pairDifferenceCorrected: corrected.pairDifference,
      completeness: null,
    }),
    budget: sizeBudget(budget, state),
  };
}

/** Before there are readings no power bounds ΔT: the limits at the least state of all. */
function plateTermOf({ meterPlate, edits }: PointEvidence): WorkedOutInstallation["plateTerm"] {
  const [term] = meterPlate ? budgetFromPlate(meterPlate, null, edits).terms : [];
  return term
    ? { term: presentTerm(term), expandedPercent: COVERAGE_FACTOR * term.standard }
    : null;
}

/** The budget of times no installation speaks for. */
export function defaultBudget(background: PointBackground, onDate: string) {
  const { loop, point, pipe } = background;
  const state = budgetStateOf(loop, point.meterSide, null, pipe?.insideDiameterMm ?? null);
  return sizeBudget(budgetOf(background, null, { onDate, state: null }), state);
}

/** True flow over the flow shown, by the square of the bores; null where either is not known. */
function flowFactorOf(trueMm: number | null, enteredMm: number | null): number | null {
  return trueMm === null || enteredMm === null ? null : (trueMm / enteredMm) ** 2;
}

function zeroFlow(zero: InstallationFields["zero"], boreMm: number | null): number | null {
  const speed = zero?.readingMPerS ?? zero?.remainingMPerS ?? null;
  return speed === null || boreMm === null ? null : speed * flowAreaM2(boreMm) * 1000;
}

/** Only what is known is judged: an assumed speed or ΔT gives no verdict. */
function judgedState(
  { fluid, point }: PointBackground,
  { at, usual }: BudgetState,
  boreMm: number | null,
) {
  const velocity = at.velocityFrom === "assumed" ? null : at.velocityMPerS;
  const meterC = usual && (point.meterSide === "supply" ? usual.supplyC : usual.returnC);
  const liquid =
    fluid.ok && meterC !== null && meterC >= fluid.fluid.lowestC && meterC <= fluid.fluid.highestC;
  return {
    velocityMPerS: velocity,
    reynolds:
      velocity === null || boreMm === null || !liquid
        ? null
        : reynoldsNumber({
            velocityMPerS: velocity,
            boreMm,
            densityKgPerM3: fluid.fluid.density(meterC),
            viscosityPaS: fluid.fluid.viscosityPaS(meterC),
          }),
    deltaTK: at.deltaTFrom === "assumed" ? null : at.deltaTK,
  };
}

function namesOf(
  { flowMeterId, loggerId, probes }: InstallationFields,
  { instruments }: EvidenceRecords,
): WorkedOutInstallation["instruments"] {
  const name = (id: string | null | undefined) => {
    const row: Instrument | undefined = id ? instruments.get(id) : undefined;
    return row ? { id: row.id, serial: row.serial, label: row.label, kind: row.kind } : null;
  };
  return {
    flowMeter: name(flowMeterId),
    logger: name(loggerId),
    supplyProbe: name(probes?.supply.probeId),
    returnProbe: name(probes?.return.probeId),
  };
}
