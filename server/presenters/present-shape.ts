import type { z } from "zod";
import type { getPointShape } from "@shared/contracts/shape";
import { BASE_LOAD_PERCENTILE } from "@shared/domain/analysis/base-load";
import { fullLoadHours, loadFactor } from "@shared/domain/analysis/load-factor";
import type { PeakDemand } from "@shared/domain/energy/demand";
import type { Interval } from "@shared/domain/time/interval";
import { instantText } from "@server/database/conversions";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import { longestRuns } from "@server/queries/shape/longest-runs";
import type { LoadShape, RangeLoad } from "@server/queries/shape/load-shape";
import type { ShapePlusMinus } from "@server/queries/shape/shape-plus-minus";
import { presentBasis, rounded, roundedOrNull } from "./present-energy";
import { plainPrice } from "./present-pump";
import { presentOccupied } from "./present-site";

type ShapeAnswer = z.input<(typeof getPointShape)["answer"]>;

const mostRuns = 20;
const at = (ms: number) => instantText(new Date(ms));

export function presentShape(
  energyPoint: EnergyPoint,
  range: Interval,
  load: RangeLoad,
  shape: LoadShape,
  plusMinus: ShapePlusMinus,
  asked: { readonly windowMinutes: number; readonly expectedS: number },
): ShapeAnswer {
  const { site } = energyPoint;
  const { totals, steps } = load;
  const { coveredS } = totals;
  const covered = (value: number | null, decimals: number) =>
    coveredS > 0 && value !== null ? rounded(value, decimals) : null;
  const peak = (kind: "fixed" | "rolling") => {
    const found: PeakDemand | null = shape.peaks[kind];
    return (
      found && {
        from: at(found.startMs),
        to: at(found.endMs),
        powerKw: rounded(found.powerKw, 4),
        plusMinus: plusMinus[kind],
        loadFactor: roundedOrNull(loadFactor(shape.energyKwh, coveredS, found)?.value ?? null, 7),
        fullLoadHours: roundedOrNull(fullLoadHours(shape.energyKwh, found.powerKw), 4),
      }
    );
  };
  const { still, low, baseLoad, offHours, means, specificFlow } = shape;
  return {
    zone: site.zone,
    from: at(range.startMs),
    to: at(range.endMs),
    basis: presentBasis(energyPoint),
    register: load.register,
    stepMinutes: steps.stepMs / 60_000,
    windowMinutes: asked.windowMinutes,
    coveredS: rounded(coveredS, 3),
    expectedS: rounded(asked.expectedS, 3),
    energyKwh: covered(shape.energyKwh, 4),
    volumeM3: covered(shape.volumeM3, 4),
    meanKw: coveredS > 0 ? rounded(shape.energyKwh / (coveredS / 3600), 4) : null,
    meanPlusMinus: plusMinus.mean,
    peaks: { fixed: peak("fixed"), rolling: peak("rolling") },
    design:
      shape.designKw === null
        ? null
        : {
            powerKw: rounded(shape.designKw, 4),
            fullLoadHours: roundedOrNull(fullLoadHours(shape.energyKwh, shape.designKw), 4),
          },
    curve: shape.curve.map(({ hours, powerKw }) => ({
      hours: rounded(hours, 4),
      powerKw: rounded(powerKw, 4),
    })),
    deltaT: {
      flowWeightedK: roundedOrNull(means.flowWeightedK, 6),
      energyWeightedK: roundedOrNull(means.energyWeightedK, 6),
      timeMeanK: roundedOrNull(means.timeMeanK, 6),
      fromEnergyK: roundedOrNull(shape.fromEnergyK, 6),
      plusMinus: {
        flowWeighted: plusMinus.flowWeightedK,
        energyWeighted: plusMinus.energyWeightedK,
        timeMean: plusMinus.timeMeanK,
      },
    },
    specificFlow: specificFlow && {
      m3PerKwh: rounded(specificFlow.m3PerKwh, 8),
      litresPerSecondPerKw: rounded(specificFlow.litresPerSecondPerKw, 8),
      gpmPerTon: rounded(specificFlow.gpmPerTon, 6),
      plusMinus: plusMinus.volumePerEnergy,
    },
    occupiedHours: presentOccupied(site),
    baseLoad: baseLoad && {
      powerKw: rounded(baseLoad.powerKw, 4),
      plusMinus: plusMinus.baseLoad,
      percentile: BASE_LOAD_PERCENTILE * 100,
      hours: baseLoad.hours,
      steps: baseLoad.steps,
    },
    offHours: {
      energyShare: roundedOrNull(offHours.energyShare, 6),
      energyKwh: covered(offHours.unoccupiedKwh, 4),
      dayOffRatio: roundedOrNull(offHours.dayOffRatio, 6),
    },
    pumpWithoutDeltaT: still && {
      limitK: still.limitK,
      seconds: rounded(still.seconds, 3),
      runs: longestRuns(still.runs, mostRuns).map((run) => ({
        from: at(run.startMs),
        to: at(run.endMs),
      })),
      runCount: still.runs.length,
    },
    lowDeltaT: low && { limitK: rounded(low.limitK, 6), seconds: rounded(low.seconds, 3) },
    ...presentExcess(energyPoint, shape),
  };
}

function presentExcess(
  { site }: EnergyPoint,
  { excess, pump, energyKwh }: LoadShape,
): Pick<ShapeAnswer, "excess" | "pumping"> {
  const found = excess?.found ?? null;
  if (excess === null || found === null) return { excess: null, pumping: null };
  const price = pump?.pricePerKwh ?? null;
  const pumping = found.pump;
  return {
    excess: {
      designDeltaTK: excess.designDeltaTK,
      minimumFlowM3PerHour: excess.minimumFlowM3PerHour,
      volumeM3: rounded(found.volumeM3, 4),
      idealVolumeM3: rounded(found.idealVolumeM3, 4),
      excessShare: roundedOrNull(found.excessShare, 7),
      leftOutS: rounded(found.leftOutS, 3),
    },
    pumping: pumping && {
      energyKwh: rounded(pumping.energyKwh, 4),
      idealEnergyKwh: rounded(pumping.idealEnergyKwh, 4),
      excessKwh: rounded(pumping.excessKwh, 4),
      kwhPerMwh: energyKwh > 0 ? rounded(pumping.energyKwh / (energyKwh / 1000), 5) : null,
      cubeLawHolds: pump?.curve?.staticHeadM === 0,
      pricePerKwh: price === null ? null : plainPrice(price),
      currency: site.currency,
      excessCost: price === null ? null : rounded(pumping.excessKwh * Number(price), 6),
    },
  };
}
