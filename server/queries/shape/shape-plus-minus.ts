import type { PlusMinus } from "@shared/contracts/plus-minus";
import { volumePerEnergyPercent } from "@shared/domain/uncertainty/volume-per-energy";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import type { EnergyRange } from "@server/queries/energy/energy-range";
import { energyRows, type EnergyRow } from "@server/queries/energy/energy-rows";
import { loadFigureEvidence, type FigureEvidence } from "@server/queries/workings/figure-evidence";
import { figureUncertainty, plusMinusOf } from "@server/queries/workings/figure-uncertainty";
import { windowPlusMinus } from "@server/queries/workings/range-plus-minus";
import type { LoadShape, RangeLoad } from "./load-shape";

type Known = PlusMinus | null;

/** The ± of the figures of a load's shape; null where there is none. */
export interface ShapePlusMinus {
  readonly mean: Known;
  readonly fixed: Known;
  readonly rolling: Known;
  readonly baseLoad: Known;
  readonly flowWeightedK: Known;
  readonly energyWeightedK: Known;
  readonly timeMeanK: Known;
  readonly volumePerEnergy: Known;
}

/** From the rows that the range's totals, its peaks and its base load are made of. */
export async function shapePlusMinus(
  { database, scope }: { readonly database: Database; readonly scope: Scope },
  energyPoint: EnergyPoint,
  range: EnergyRange,
  { register }: RangeLoad,
  shape: LoadShape,
): Promise<ShapePlusMinus> {
  const at = { pointId: energyPoint.point.id, zone: energyPoint.site.zone };
  const [evidence, rows] = await Promise.all([
    loadFigureEvidence(scope, energyPoint, range),
    energyRows(database, at, range, "day"),
  ]);
  const { fixed, rolling } = shape.peaks;
  const [ofFixed, ofRolling, baseLoad] = await Promise.all([
    fixed && windowPlusMinus(database, evidence, { ...fixed, register }),
    rolling && windowPlusMinus(database, evidence, { ...rolling, register }),
    baseLoadPlusMinus(database, evidence, register, shape.baseLoad),
  ]);
  const deltaT = plusMinusOf(evidence, rows, { figure: "deltaT", register });
  const { flowWeightedK, energyWeightedK, timeMeanK } = shape.means;
  return {
    mean: plusMinusOf(evidence, rows, { figure: "power", register }),
    fixed: ofFixed,
    rolling: ofRolling,
    baseLoad,
    flowWeightedK: flowWeightedK === null ? null : deltaT,
    // An offset δ of the pair moves the mean over time by δ as it does the one by flow, and the one
    // by energy by (2 − by energy ÷ by flow)·δ, which is δ at most.
    energyWeightedK: asOf(deltaT, energyWeightedK),
    timeMeanK: asOf(deltaT, timeMeanK),
    volumePerEnergy: volumePerEnergy(evidence, rows, register, shape),
  };
}

/** The same ± in the unit, for a figure of another size. */
function asOf(plusMinus: Known, value: number | null): Known {
  if (plusMinus === null || value === null || Number.isNaN(value)) return null;
  return { ...plusMinus, percent: value > 0 ? six((100 * plusMinus.expanded) / value) : null };
}

/**
 * A percentile moves as the steps do that it lies between: their mean power's ±, in per cent of it,
 * put to the percentile. Over so few rows noise hardly shrinks, which is the cautious side.
 */
async function baseLoadPlusMinus(
  database: Database,
  evidence: FigureEvidence,
  register: RangeLoad["register"],
  base: LoadShape["baseLoad"],
): Promise<Known> {
  if (base === null) return null;
  const { point, site } = evidence.background;
  const at = { pointId: point.id, zone: site.zone };
  const rows = await Promise.all(
    base.between.map((step) => energyRows(database, at, { ...step, dates: null }, "quarterHour")),
  );
  const found = plusMinusOf(evidence, rows.flat(), { figure: "power", register });
  return ofPercent(found, base.powerKw);
}

function ofPercent(found: Known, value: number): Known {
  if (found === null || found.percent === null) return null;
  return { ...found, expanded: six((found.percent / 100) * value) };
}

function volumePerEnergy(
  evidence: FigureEvidence,
  rows: readonly EnergyRow[],
  register: RangeLoad["register"],
  { specificFlow }: LoadShape,
): Known {
  if (specificFlow === null) return null;
  const energy = figureUncertainty(evidence, rows, { figure: "energy", register });
  const volume = figureUncertainty(evidence, rows, { figure: "volume", register });
  if (typeof energy === "string" || typeof volume === "string") return null;
  const percent = six(volumePerEnergyPercent(energy.combined, volume.combined));
  return ofPercent({ expanded: 0, percent, basis: energy.basis }, specificFlow.m3PerKwh);
}

const six = (value: number) => Number(value.toPrecision(6));
