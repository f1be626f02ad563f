import type { Fill } from "@shared/contracts/corrections";
import { segmentPower } from "@shared/domain/energy/segment-power";
import { Register } from "@shared/domain/energy/power";
import { INTERVAL_MS, type IntervalEnergyColumns } from "@shared/domain/energy/interval-energy";
import type { CoveredQuarter, FillOutcome } from "@shared/domain/energy/fills/fill";
import {
  interpolate,
  LONGEST_INTERPOLATED_MS,
  type GapBetween,
} from "@shared/domain/energy/fills/interpolate";
import { likeDays, LOOK_BACK_MS } from "@shared/domain/energy/fills/like-days";
import { otherPoint } from "@shared/domain/energy/fills/other-point";
import { DAY_MS, HOUR_MS, overlap, type Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import { loadQualityRuns } from "@server/queries/energy/left-out";
import { powerOptionsOf } from "@server/readings/energy-settings";
import { loadIntervals } from "@server/readings/interval-rows";
import { loadSegments } from "@server/readings/load-segments";

/** Readings this far on either side of a gap say how another point compares with this one. */
const COMMON_MS = 28 * DAY_MS;
/** Power within this of a gap shows how far it may have gone meanwhile. */
const AROUND_MS = 2 * HOUR_MS;

export interface FillQuestion {
  readonly range: Interval;
  readonly method: Fill["method"];
  /** Only for `otherPoint`. */
  readonly otherPointId: string | null;
  readonly nowMs: number;
}

/** A fill worked out for what readings leave open of a range, and the range as it was filled. */
export async function workOutFill(
  database: Database,
  energyPoint: EnergyPoint,
  { range, method, otherPointId, nowMs }: FillQuestion,
): Promise<{ readonly outcome: FillOutcome; readonly range: Interval }> {
  if (method === "interpolation") return byLine(database, energyPoint, range, nowMs);
  const { point, site } = energyPoint;
  const gaps = await gapsOf(database, point.id, range, nowMs);
  if (method === "likeDays") {
    const quarterAt = await quarters(database, point.id, {
      startMs: range.startMs - LOOK_BACK_MS,
      endMs: range.startMs,
    });
    const { zone, occupied } = site;
    const outcome = likeDays(gaps, { zone, workingDays: occupied.weekdays, quarterAt });
    return { outcome, range };
  }
  const common = { startMs: range.startMs - COMMON_MS, endMs: range.endMs + COMMON_MS };
  const [own, other] = await Promise.all([
    quarters(database, point.id, common),
    quarters(database, otherPointId ?? point.id, common),
  ]);
  return { outcome: otherPoint(gaps, { common, own, other }), range };
}

/** The stretches of a range that no reading covers; the time yet to come is none. */
async function gapsOf(
  database: Database,
  pointId: string,
  range: Interval,
  nowMs: number,
): Promise<Interval[]> {
  const runs = await loadQualityRuns(database, pointId, range, nowMs);
  const gaps: { startMs: number; endMs: number }[] = [];
  for (const { kind, startMs, endMs } of runs) {
    if (kind === "measured") continue;
    const last = gaps.at(-1);
    if (last?.endMs === startMs) last.endMs = endMs;
    else gaps.push({ startMs, endMs });
  }
  return gaps;
}

/** A line joins whole gaps, so a range that cuts one is widened to it. */
async function byLine(
  database: Database,
  energyPoint: EnergyPoint,
  asked: Interval,
  nowMs: number,
): Promise<{ outcome: FillOutcome; range: Interval }> {
  const { point } = energyPoint;
  const margin = LONGEST_INTERPOLATED_MS + INTERVAL_MS;
  const wider = { startMs: asked.startMs - margin, endMs: asked.endMs + margin };
  const gaps = (await gapsOf(database, point.id, wider, nowMs)).filter(
    (gap) => overlap(gap, asked) !== null,
  );
  const longestMs = Math.max(0, ...gaps.map(({ startMs, endMs }) => endMs - startMs));
  if (longestMs > LONGEST_INTERPOLATED_MS)
    return { outcome: { ok: false, problem: { code: "gap-too-long", longestMs } }, range: asked };
  const between: GapBetween[] = [];
  for (const gap of gaps) {
    const found = await readingsBeside(database, energyPoint, gap);
    if (found === null)
      return { outcome: { ok: false, problem: { code: "no-reading-beside" } }, range: asked };
    between.push(found);
  }
  const snapped = (ms: number, to: typeof Math.floor) => to(ms / INTERVAL_MS) * INTERVAL_MS;
  const range = {
    startMs: snapped(Math.min(asked.startMs, ...gaps.map(({ startMs }) => startMs)), Math.floor),
    endMs: snapped(Math.max(asked.endMs, ...gaps.map(({ endMs }) => endMs)), Math.ceil),
  };
  return { outcome: interpolate(between, await powerAround(database, point.id, range)), range };
}

async function powerAround(
  database: Database,
  pointId: string,
  { startMs, endMs }: Interval,
): Promise<number[]> {
  const energy = await loadIntervals(database, pointId, startMs - AROUND_MS, endMs + AROUND_MS);
  return [...energy.startMs.keys()].flatMap((i) => {
    const coveredS = energy.coveredS[i] as number;
    const kwh = (energy.heating.energyKwh[i] as number) - (energy.cooling.energyKwh[i] as number);
    return coveredS > 0 ? [kwh / (coveredS / 3600)] : [];
  });
}

/** The usable rows next to a gap; null where there is none, as at a log's end. */
async function readingsBeside(
  database: Database,
  { point, settings }: EnergyPoint,
  gap: Interval,
): Promise<GapBetween | null> {
  const options = powerOptionsOf(settings);
  if (options === null) return null;
  const segments = await loadSegments(database, point.id, gap.startMs, gap.endMs);
  let before: GapBetween["before"] | null = null;
  let after: GapBetween["after"] | null = null;
  for (const segment of segments) {
    const { powerKw, register } = segmentPower(segment, options);
    const { instantMs, flowM3PerHour } = segment.columns;
    for (let row = 0; row < instantMs.length; row++) {
      const code = register[row];
      if (code === Register.unusable) continue;
      const counts = code !== Register.suppressed && code !== Register.against;
      const flow = flowM3PerHour?.[row] ?? NaN;
      const read = {
        powerKw: counts ? (powerKw[row] as number) : 0,
        flowM3PerHour: Number.isNaN(flow) ? null : flow,
      };
      const at = instantMs[row] as number;
      if (at <= gap.startMs) before = read;
      else if (at >= gap.endMs) after ??= read;
    }
  }
  return before && after ? { ...gap, before, after } : null;
}

async function quarters(
  database: Database,
  pointId: string,
  { startMs, endMs }: Interval,
): Promise<(startMs: number) => CoveredQuarter | null> {
  const energy = await loadIntervals(database, pointId, startMs, endMs);
  const places = new Map([...energy.startMs].map((at, place) => [at, place]));
  return (at) => {
    const place = places.get(at);
    return place === undefined ? null : quarterOf(energy, place);
  };
}

function quarterOf(energy: IntervalEnergyColumns, i: number): CoveredQuarter {
  return {
    coveredS: energy.coveredS[i] as number,
    heatingKwh: energy.heating.energyKwh[i] as number,
    coolingKwh: energy.cooling.energyKwh[i] as number,
    // A meter that counts heat alone says nothing of the water.
    volumeM3: (energy.meterOnlyS[i] as number) > 0 ? null : (energy.volumeM3[i] as number),
  };
}
