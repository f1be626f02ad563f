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
import { budgetFromPlate } from "@shared/domain/uncertainty/meter-plate";
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
  /** By flow and temperatures, or by the power or energy of a permanent meter. */
  readonly measuredBy: "water" | "meter";
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
  const stretches = evidenceParts(evidence.installations, range);
  const found = ofHeat(asked)
    ? stretches.flatMap((part) => heatParts(evidence, rows, part, asked.register))
    : stretches.flatMap((part) => waterOnly(evidence, rows, part, asked.register));
  const parts = found.flatMap((part) => part ?? []);
  if (parts.length < found.length) return "noUncertaintyForMeter";
  if (parts.length === 0) return "nothingCovered";
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
  return shownPlusMinus(figureUncertainty(evidence, rows, asked));
}

export function shownPlusMinus(found: FigureUncertainty | WithoutUncertainty): PlusMinus | null {
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

const ofHeat = ({ figure }: AskedFigure) => figure === "energy" || figure === "power";

/** Volume and ΔT are of the time in which flow and temperatures were measured, and of no other. */
function waterOnly(
  evidence: FigureEvidence,
  rows: readonly EnergyRow[],
  part: EvidencePart,
  register: RegisterName,
): FigurePart[] {
  const sums = sumsWithin(rows, part, register);
  return hasWater(sums) ? [waterPart(evidence, part, sums)] : [];
}

const hasWater = ({ coveredS, meterOnlyS }: PartSums) => coveredS - meterOnlyS > ROUNDING_S;

/**
 * A stretch by what gave its energy; a row that a meter gave some of counts as the meter's. Null
 * stands for a meter's time whose class nobody recorded.
 */
function heatParts(
  evidence: FigureEvidence,
  rows: readonly EnergyRow[],
  part: EvidencePart,
  register: RegisterName,
): (FigurePart | null)[] {
  const isMeters = ({ totals }: EnergyRow) => totals.meterOnlyS > ROUNDING_S;
  const water = sumsWithin(
    rows.filter((row) => !isMeters(row)),
    part,
    register,
  );
  const meter = sumsWithin(rows.filter(isMeters), part, register);
  return [
    ...(water.coveredS > 0 ? [waterPart(evidence, part, water)] : []),
    ...(meter.coveredS > 0 ? [meterPart(evidence, part, meter)] : []),
  ];
}

/**
 * A stretch whose energy a permanent meter gave: by its plate. Where part of a row was worked out from
 * flow and temperatures instead, the wider of the two budgets speaks for all of it. Null where nobody
 * recorded the meter's class.
 */
function meterPart(
  evidence: FigureEvidence,
  part: EvidencePart,
  sums: PartSums,
): FigurePart | null {
  const { meterPlate: plate, edits } = part.installation?.evidence ?? {
    meterPlate: null,
    edits: [],
  };
  if (plate === null) return null;
  const meanPowerKw = quotient(sums.energyKwh, sums.runningS / 3600);
  const budget = budgetFromPlate(plate, meanPowerKw, edits);
  const metered = { part, sums, budget, velocityMPerS: null, measuredBy: "meter" } as const;
  if (!hasWater(sums)) return metered;
  const asWater = waterPart(evidence, part, sums);
  const percentOf = (one: FigurePart) =>
    combinePart({ figure: "energy" }, one, 1)?.expandedPercent ?? 0;
  return percentOf(asWater) > percentOf(metered) ? asWater : metered;
}

function waterPart(evidence: FigureEvidence, part: EvidencePart, sums: PartSums): FigurePart {
  const { background, zone, intervalS } = evidence;
  const recorded = part.installation?.evidence ?? null;
  const onDate = localDateOf(sums.lastCoveredMs ?? part.startMs, zone);
  const { meanSupplyC: supplyC, meanReturnC: returnC } = sums;
  const budgetAt = (speed: number | null) =>
    budgetOf(background, recorded, {
      onDate,
      intervalS,
      pairDifferenceCorrected: isPairCorrected(part, evidence),
      state:
        supplyC === null || returnC === null ? null : { supplyC, returnC, velocityMPerS: speed },
    });
  // The bore is a matter of the record alone, and the speed follows from it.
  const { boreMm } = budgetAt(null);
  const meanFlow = quotient(sums.allVolumeM3, sums.movingS / 3600);
  const speed = meanFlow === null || boreMm === null ? null : velocityMPerS(meanFlow, boreMm);
  return { part, sums, budget: budgetAt(speed), velocityMPerS: speed, measuredBy: "water" };
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
  { figure }: Pick<AskedFigure, "figure">,
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
    ...(flowMeter ? { meterLimits: flowMeter.serial } : {}),
    ...(pair ? { probePair: pair, pairDrift: pair } : {}),
  };
}

/** Null where there is nothing to divide by. */
export function quotient(numerator: number, denominator: number): number | null {
  return denominator > 0 ? numerator / denominator : null;
}
