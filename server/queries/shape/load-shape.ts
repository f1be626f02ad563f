import { baseLoad, lowDeltaT, offHours, type BaseLoad } from "@shared/domain/analysis/base-load";
import {
  durationCurve,
  thinnedCurve,
  type DurationPoint,
} from "@shared/domain/analysis/duration-curve";
import { excessFlow, flowAtDesignM3PerHour } from "@shared/domain/analysis/excess-flow";
import { loadStepMs, loadSteps, type LoadSteps } from "@shared/domain/analysis/load-steps";
import { specificFlow } from "@shared/domain/analysis/specific-flow";
import { peakDemand, type PeakDemand } from "@shared/domain/energy/demand";
import { heatCoefficient } from "@shared/domain/energy/heat-coefficient";
import {
  deltaTMeans,
  totalEnergy,
  waterSeconds,
  type EnergyTotals,
} from "@shared/domain/energy/totals";
import { DAY_MS, type Interval } from "@shared/domain/time/interval";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import type { Database } from "@server/database/connect";
import { Invalid } from "@server/http/errors";
import type { LoopPump } from "@server/models/loop-pump";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import { requireQuarterHours } from "@server/queries/energy/energy-range";
import { registerOf, type RegisterName } from "@server/queries/energy/loads";
import { loadIntervals } from "@server/readings/interval-rows";

/** Two years of quarter-hours: more would take longer than a request may. */
const mostDays = 2 * 366;
/** Below this the pump moves water for nothing. */
export const STILL_DELTA_T_K = 1;
/** A difference below this share of the design is low. */
const LOW_SHARE_OF_DESIGN = 2 / 3;

export interface ShapeWishes {
  readonly windowMinutes: number;
  readonly hours: BaseLoad["hours"];
  readonly minimumFlowM3PerHour: number | null;
  readonly lowDeltaTK: number | null;
}

/** The stored quarter-hours of a range as steps of the register that counts. */
export interface RangeLoad {
  readonly register: RegisterName;
  readonly totals: EnergyTotals;
  readonly steps: LoadSteps;
}

/** @throws Invalid (422) where the range cuts a quarter-hour or is longer than two years. */
export async function rangeLoad(
  database: Database,
  { point, loop, site, readings }: EnergyPoint,
  range: Interval,
): Promise<RangeLoad> {
  requireQuarterHours(range);
  if (range.endMs - range.startMs > mostDays * DAY_MS)
    throw new Invalid([
      {
        pointer: "/query/to",
        code: "range-too-long",
        message: "The shape of a load is worked out for two years at most.",
      },
    ]);
  const columns = await loadIntervals(database, point.id, range.startMs, range.endMs);
  const totals = totalEnergy(columns);
  const register = registerOf(loop.service, totals);
  const offsets = zoneOffsets(site.zone);
  const steps = loadSteps(columns, {
    register,
    volume: loop.service === "changeover" ? "register" : "all",
    stepMs: loadStepMs(readings.nominalStepMs),
    offsetAt: (ms) => offsets.offsetAt(ms),
  });
  return { register, totals, steps };
}

/** Every figure of the load's shape; what is unknown is null. */
export function loadShape(
  { loop, point, site, settings }: EnergyPoint,
  { register, totals, steps }: RangeLoad,
  pump: LoopPump | null,
  wishes: ShapeWishes,
) {
  const offsets = zoneOffsets(site.zone);
  const toLocal = (ms: number) => offsets.toLocal(ms);
  const { occupied } = site;
  const { energyKwh } = totals[register];
  const volumeM3 = loop.service === "changeover" ? totals[register].volumeM3 : totals.volumeM3;
  const peak = (kind: "fixed" | "rolling"): PeakDemand | null =>
    peakDemand(steps, { kind, windowMinutes: wishes.windowMinutes }, (ms) => offsets.offsetAt(ms));
  const fluid = settings.fluid.ok ? settings.fluid.fluid : null;
  const { designDeltaTK, designFlowM3PerHour } = loop;
  const lowLimitK =
    wishes.lowDeltaTK ?? (designDeltaTK === null ? null : designDeltaTK * LOW_SHARE_OF_DESIGN);
  const stillM3PerHour = settings.cutOffs.flowM3PerHour ?? 0;
  const minimumFlowM3PerHour = wishes.minimumFlowM3PerHour ?? pump?.minimumFlowM3PerHour ?? null;
  const carrying =
    fluid && designDeltaTK !== null
      ? { fluid, register, meterSide: point.meterSide, designDeltaTK, minimumFlowM3PerHour }
      : null;
  const flowOfOneKw =
    carrying && totals.meanSupplyC !== null
      ? flowAtDesignM3PerHour(1, totals.meanSupplyC, carrying)
      : null;
  const means = deltaTMeans(totals[register], totals.meterOnlyS);
  const { meanSupplyC } = totals;
  const signedK = (register === "cooling" ? 1 : -1) * (means.flowWeightedK ?? NaN);
  // At the mean supply and the return that the flow-weighted difference gives.
  const k =
    fluid && meanSupplyC !== null
      ? heatCoefficient(fluid, point.meterSide, meanSupplyC, meanSupplyC + signedK)
      : null;
  return {
    energyKwh,
    volumeM3: waterSeconds(totals) > 0 ? volumeM3 : null,
    peaks: { fixed: peak("fixed"), rolling: peak("rolling") },
    designKw:
      flowOfOneKw === null || designFlowM3PerHour === null
        ? null
        : designFlowM3PerHour / flowOfOneKw,
    curve: thinnedCurve(durationCurve(steps)) as readonly DurationPoint[],
    means,
    fromEnergyK: k && volumeM3 > 0 ? energyKwh / (k.kwhPerM3K * volumeM3) : null,
    specificFlow: waterSeconds(totals) > 0 ? specificFlow(volumeM3, energyKwh) : null,
    baseLoad: baseLoad(steps, wishes.hours, occupied, toLocal),
    offHours: offHours(steps, occupied, toLocal),
    still: lowDeltaT(steps, STILL_DELTA_T_K, stillM3PerHour),
    low: lowLimitK === null ? null : lowDeltaT(steps, lowLimitK, stillM3PerHour),
    excess: carrying && {
      ...carrying,
      found: excessFlow(steps, { ...carrying, pump: pump?.curve ?? null }),
    },
    pump,
  };
}

export type LoadShape = ReturnType<typeof loadShape>;
