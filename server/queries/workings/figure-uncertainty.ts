import { velocityMPerS } from "@shared/domain/pipes/bore";
import type { Interval } from "@shared/domain/time/interval";
import { localDateOf } from "@shared/domain/time/local-calendar";
import type { Budget, CombinedUncertainty } from "@shared/domain/uncertainty/budget";
import { budgetBasis, type BudgetBasis } from "@shared/domain/uncertainty/budget-basis";
import {
  combineInstallations,
  type InstallationPart,
} from "@shared/domain/uncertainty/combine-installations";
import { combinePeriod } from "@shared/domain/uncertainty/combine-period";
import type { UncertainFigure } from "@shared/domain/uncertainty/figures";
import type { PlusMinus } from "@shared/contracts/plus-minus";
import { budgetOf, type StandingInstallation } from "@server/queries/evidence/point-evidence";
import type { EnergyRow } from "@server/queries/energy/energy-rows";
import type { RegisterName } from "@server/queries/energy/loads";
import {
  evidenceParts,
  isPairCorrected,
  type EvidencePart,
  type FigureEvidence,
} from "./figure-evidence";
import { sumsWithin, type PartSums } from "./part-sums";

export interface AskedFigure {
  readonly figure: UncertainFigure;
  readonly register: RegisterName;
}

/** Why a figure has no ±; one of the cautions of its workings. */
export type WithoutUncertainty =
  "nothingCovered" | "noUncertaintyForMeter" | "noUncertaintyWithoutFlow";

/** One stretch with its budget, put to what the stretch measured. */
export interface FigurePart {
  readonly part: EvidencePart;
  readonly sums: PartSums;
  readonly budget: Budget;
  readonly velocityMPerS: number | null;
}

export interface FigureUncertainty {
  readonly combined: CombinedUncertainty;
  readonly basis: BudgetBasis;
  /** Stretches with readings, in order of time. */
  readonly parts: readonly FigurePart[];
}

/** Seconds of a meter's power that rounding may leave in a range of a flow meter's readings. */
const ROUNDING_S = 1;

/**
 * The ± of a figure over rows that are quarter-hours, days or any other stretches: each installation's
 * budget put to the flow-weighted ΔT and the ΔT-weighted speed of its own time, then combined.
 * A mean is treated as the sum of what each stretch contributes to it.
 */
export function figureUncertainty(
  evidence: FigureEvidence,
  rows: readonly EnergyRow[],
  asked: AskedFigure,
): FigureUncertainty | WithoutUncertainty {
  const range = spanOf(rows);
  if (range === null) return "nothingCovered";
  const parts = evidenceParts(evidence.installations, range).flatMap((part) => {
    const sums = sumsWithin(rows, part, asked.register);
    return sums.coveredS > 0 ? [partOf(evidence, part, sums)] : [];
  });
  if (parts.length === 0) return "nothingCovered";
  if (parts.some(({ sums }) => sums.meterOnlyS > ROUNDING_S)) return "noUncertaintyForMeter";
  const moved = parts.filter(({ sums }) => contribution(asked, sums) > 0);
  const combined = combine(asked, moved);
  if (combined === null) return "noUncertaintyWithoutFlow";
  return { combined, basis: basisOf(moved), parts };
}

/** The same as screens print it beside the figure; null where there is none. */
export function plusMinusOf(
  evidence: FigureEvidence,
  rows: readonly EnergyRow[],
  asked: AskedFigure,
): PlusMinus | null {
  const found = figureUncertainty(evidence, rows, asked);
  return typeof found === "string" ? null : presentPlusMinus(found);
}

export function presentPlusMinus({ combined, basis }: FigureUncertainty): PlusMinus {
  const six = (value: number) => Number(value.toPrecision(6));
  return { expanded: six(combined.expanded), percent: six(combined.expandedPercent), basis };
}

function spanOf(rows: readonly EnergyRow[]): Interval | null {
  const first = rows[0];
  const last = rows.at(-1);
  return first && last ? { startMs: first.startMs, endMs: last.endMs } : null;
}

function partOf(evidence: FigureEvidence, part: EvidencePart, sums: PartSums): FigurePart {
  const { background, zone, intervalS } = evidence;
  const recorded = part.installation?.evidence ?? null;
  const onDate = localDateOf(sums.lastCoveredMs ?? part.startMs, zone);
  const { meanSupplyC: supplyC, meanReturnC: returnC } = sums;
  const budgetAt = (speed: number | null) =>
    budgetOf(background, recorded, {
      onDate,
      intervalS,
      pairDifferenceCorrected: isPairCorrected(part, evidence.offsets),
      state:
        supplyC === null || returnC === null ? null : { supplyC, returnC, velocityMPerS: speed },
    });
  // The bore is a matter of the record alone, and the speed follows from it.
  const { boreMm } = budgetAt(null);
  const meanFlow = quotient(sums.allVolumeM3, sums.movingS / 3600);
  const speed = meanFlow === null || boreMm === null ? null : velocityMPerS(meanFlow, boreMm);
  return { part, sums, budget: budgetAt(speed), velocityMPerS: speed };
}

function combine(asked: AskedFigure, parts: readonly FigurePart[]): CombinedUncertainty | null {
  const whole = divisor(asked, parts);
  const put: InstallationPart[] = [];
  for (const one of parts) {
    const value = contribution(asked, one.sums) / whole;
    const combined = combinePart(asked, one, value);
    if (combined === null) return null;
    put.push({ value, combined, sources: sourcesOf(one.part.installation) });
  }
  const [only] = put;
  return put.length === 1 && only ? only.combined : combineInstallations(put);
}

function combinePart(
  { figure }: AskedFigure,
  { sums, budget, velocityMPerS: meanVelocity }: FigurePart,
  value: number,
): CombinedUncertainty | null {
  const weightedFlow = quotient(sums.flowDeltaTM3K, sums.deltaTKs / 3600);
  const { boreMm } = budget;
  return combinePeriod(budget, {
    figure,
    value,
    flowWeightedDeltaTK: quotient(sums.flowDeltaTM3K, sums.volumeM3),
    deltaTWeightedVelocityMPerS:
      weightedFlow === null || boreMm === null ? null : velocityMPerS(weightedFlow, boreMm),
    meanVelocityMPerS: meanVelocity,
    meanFlowM3PerHour: quotient(sums.allVolumeM3, sums.movingS / 3600),
    samples: Math.max(1, sums.samples),
    flowSpreadM3PerHour: sums.flowSpreadM3PerHour,
    deltaTSpreadK: sums.deltaTSpreadK,
  });
}

/** What a stretch adds to the figure's sum: energy for powers, volume times ΔT for ΔT. */
function contribution({ figure }: AskedFigure, sums: PartSums): number {
  switch (figure) {
    case "volume":
      return sums.allVolumeM3;
    case "deltaT":
      return sums.flowDeltaTM3K;
    case "energy":
    case "power":
      return sums.energyKwh;
  }
}

/** What the sum is divided by to give the figure. */
function divisor({ figure }: AskedFigure, parts: readonly FigurePart[]): number {
  const sum = (of: (sums: PartSums) => number) =>
    parts.reduce((total, { sums }) => total + of(sums), 0);
  if (figure === "power") return sum((sums) => sums.coveredS) / 3600;
  return figure === "deltaT" ? sum((sums) => sums.volumeM3) : 1;
}

function basisOf(parts: readonly FigurePart[]): BudgetBasis {
  const kinds = new Set(parts.map(({ budget }) => budgetBasis(budget)));
  const [only] = kinds;
  return kinds.size === 1 && only ? only : "partlyDefaults";
}

/** What the same error would come from again: a meter's certificate, a pair's check. */
function sourcesOf(
  installation: StandingInstallation | null,
): NonNullable<InstallationPart["sources"]> {
  const { flowMeter, probes } = installation?.evidence ?? { flowMeter: null, probes: null };
  const pair = probes && [probes.supply.serial, probes.return.serial].sort().join(" ");
  return {
    ...(flowMeter ? { certificate: flowMeter.serial, drift: flowMeter.serial } : {}),
    ...(pair ? { probePair: pair, pairDrift: pair } : {}),
  };
}

/** Null where there is nothing to divide by. */
export function quotient(numerator: number, denominator: number): number | null {
  return denominator > 0 ? numerator / denominator : null;
}
