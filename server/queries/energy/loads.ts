import type { LoopService } from "@shared/contracts/places";
import { peakDemand } from "@shared/domain/energy/demand";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import { deltaTMeans, waterSeconds, type EnergyTotals } from "@shared/domain/energy/totals";
import { HOUR_MS, type Interval } from "@shared/domain/time/interval";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import { selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";

export type RegisterName = "heating" | "cooling";

/** What a loop card shows: means over a stretch, all of the same register and time. */
export interface Load extends Interval {
  readonly register: RegisterName;
  /** Null where only a permanent meter's power is known. */
  readonly supplyC: number | null;
  readonly returnC: number | null;
  readonly flowM3PerHour: number | null;
  readonly deltaTK: number | null;
  readonly powerKw: number;
}

/** The register a loop's service names; on a changeover loop the one that moved more heat. */
export function registerOf(service: LoopService, totals: EnergyTotals): RegisterName {
  if (service !== "changeover") return service === "hot" ? "heating" : "cooling";
  return totals.heating.energyKwh > totals.cooling.energyKwh ? "heating" : "cooling";
}

/** Means over covered time, ΔT weighted by flow; null where nothing is covered or nothing ran. */
export function loadOf(
  period: Interval,
  totals: EnergyTotals,
  register: RegisterName,
): Load | null {
  const { flowWeightedK } = deltaTMeans(totals[register]);
  const { meanSupplyC, meanReturnC, coveredS } = totals;
  if (coveredS === 0) return null;
  const load = { startMs: period.startMs, endMs: period.endMs, register };
  const powerKw = totals[register].energyKwh / (coveredS / 3600);
  const hours = waterSeconds(totals) / 3600;
  if (hours === 0 || meanSupplyC === null || meanReturnC === null)
    return {
      ...load,
      supplyC: null,
      returnC: null,
      flowM3PerHour: null,
      deltaTK: null,
      powerKw,
    };
  const sign = register === "heating" ? 1 : -1;
  return {
    ...load,
    supplyC: meanSupplyC,
    returnC: meanReturnC,
    flowM3PerHour: totals.volumeM3 / hours,
    deltaTK: flowWeightedK ?? sign * (meanSupplyC - meanReturnC),
    powerKw,
  };
}

/** Energy and covered time of a range's quarter-hours: the two columns a year can be searched in. */
export interface PowerColumns {
  readonly startMs: Float64Array;
  readonly coveredS: Float64Array;
  readonly kwh: Readonly<Record<RegisterName, Float64Array>>;
}

export async function loadPowerColumns(
  database: Database,
  pointId: string,
  range: Interval,
): Promise<PowerColumns> {
  const rows = await selectMany(
    database,
    `SELECT start_s, covered_s, heating_kwh, cooling_kwh FROM interval_energy
      WHERE point_id = ? AND start_s >= ? AND start_s < ? ORDER BY start_s`,
    [pointId, Math.ceil(range.startMs / 1000), Math.ceil(range.endMs / 1000)],
  );
  // A covered whole quarter-hour and a register at rest are stored as NULL.
  return {
    startMs: Float64Array.from(rows, ([startS]) => Number(startS) * 1000),
    coveredS: Float64Array.from(rows, ([, covered]) => Number(covered ?? INTERVAL_MS / 1000)),
    kwh: {
      heating: Float64Array.from(rows, ([, , heating]) => Number(heating ?? 0)),
      cooling: Float64Array.from(rows, ([, , , cooling]) => Number(cooling ?? 0)),
    },
  };
}

/** The busiest fully covered half hour of the wall clock, of either register. */
export function busiestHalfHour(
  { startMs, coveredS, kwh }: PowerColumns,
  zone: string,
  registers: readonly RegisterName[],
): (Interval & { register: RegisterName }) | null {
  const offsets = zoneOffsets(zone);
  const halfHour = { kind: "fixed", windowMinutes: 30 } as const;
  const found = registers.flatMap((register) => {
    const steps = { stepMs: INTERVAL_MS, startMs, coveredS, energyKwh: kwh[register] };
    const peak = peakDemand(steps, halfHour, (ms) => offsets.offsetAt(ms));
    // A register that did nothing was never busy.
    return peak && peak.powerKw > 0 ? [{ ...peak, register }] : [];
  });
  found.sort((a, b) => b.powerKw - a.powerKw);
  return found[0] ?? null;
}

/** Named wherever the figure is shown: a night base without its hours cannot be compared. */
export const nightHours = { fromHour: 0, toHour: 5 } as const;

export interface NightBase {
  readonly powerKw: number;
  /** Covered share of the nights' time. */
  readonly coverage: number;
}

/** Mean power of one register from midnight to five by the wall clock; null where none is covered. */
export function nightBase(
  { startMs, coveredS, kwh }: PowerColumns,
  zone: string,
  register: RegisterName,
  nights: number,
): NightBase | null {
  const offsets = zoneOffsets(zone);
  let energyKwh = 0;
  let covered = 0;
  for (let i = 0; i < startMs.length; i++) {
    const localMs = offsets.toLocal(startMs[i] as number);
    const hour = new Date(localMs).getUTCHours();
    if (hour < nightHours.fromHour || hour >= nightHours.toHour) continue;
    energyKwh += kwh[register][i] as number;
    covered += coveredS[i] as number;
  }
  if (covered === 0) return null;
  const expectedS = nights * (nightHours.toHour - nightHours.fromHour) * (HOUR_MS / 1000);
  return { powerKw: energyKwh / (covered / 3600), coverage: Math.min(1, covered / expectedS) };
}
