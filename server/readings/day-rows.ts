import type { Transaction } from "sequelize";
import { ENGINE_VERSION, type IntervalEnergyColumns } from "@shared/domain/energy/interval-energy";
import {
  totalEnergy,
  waterSeconds,
  type EnergyTotals,
  type RegisterTotals,
} from "@shared/domain/energy/totals";
import type { LocalDay } from "@shared/domain/time/local-calendar";
import { insertMany, selectMany, type SqlRow, type SqlValue } from "@server/database/bulk";
import type { Database } from "@server/database/connect";

/** What one local day of a point adds up to. */
export interface DayEnergy extends LocalDay {
  readonly lengthS: number;
  readonly totals: EnergyTotals;
  /** Measured rows at temperatures that liquid water cannot have; they gave no energy. */
  readonly outsideFluidRows: number;
}

const registerNames = ["heating", "cooling"] as const;
const registerParts = [
  ["kwh", "energyKwh"],
  ["m3", "volumeM3"],
  ["flow_dt", "flowDeltaTM3K"],
  ["power_dt", "powerDeltaTKwhK"],
  ["dt", "deltaTKs"],
  ["s", "runningS"],
] as const;
const columns = [
  "point_id",
  "local_date",
  "organisation_id",
  "start_ms",
  "length_s",
  "covered_s",
  ...registerNames.flatMap((name) => registerParts.map(([part]) => `${name}_${part}`)),
  "volume_m3",
  "suppressed_kwh",
  "suppressed_s",
  "min_power_kw",
  "max_power_kw",
  "min_flow",
  "max_flow",
  "supply_cs",
  "return_cs",
  "measured_rows",
  "excluded_rows",
  "no_reading_rows",
  "outside_water_rows",
  "apportioned",
  "meter_only_s",
  "against_rows",
  "engine_version",
];

const insert = `INSERT INTO day_energy (${columns.join(", ")})
  VALUES (${columns.map(() => "?").join(", ")})
  ON DUPLICATE KEY UPDATE ${columns
    .slice(2)
    .map((name) => `${name} = VALUES(${name})`)
    .join(", ")}`;

function rowOf(organisationId: string, pointId: string, day: DayEnergy): SqlValue[] {
  const { totals } = day;
  return [
    pointId,
    day.date,
    organisationId,
    day.startMs,
    day.lengthS,
    totals.coveredS,
    ...registerNames.flatMap((name) => registerParts.map(([, field]) => totals[name][field])),
    totals.volumeM3,
    totals.suppressedKwh,
    totals.suppressedS,
    totals.minPowerKw,
    totals.maxPowerKw,
    totals.minFlowM3PerHour,
    totals.maxFlowM3PerHour,
    (totals.meanSupplyC ?? 0) * waterSeconds(totals),
    (totals.meanReturnC ?? 0) * waterSeconds(totals),
    totals.measuredRows,
    totals.excludedRows,
    totals.noReadingRows,
    day.outsideFluidRows,
    totals.apportioned ? 1 : 0,
    totals.meterOnlyS,
    totals.againstRows,
    ENGINE_VERSION,
  ];
}

/** The days of `days` that hold any row, summed from intervals. */
export function sumDays(
  intervals: IntervalEnergyColumns,
  days: readonly LocalDay[],
  outsideFluidRowsOf: (day: LocalDay) => number,
): DayEnergy[] {
  return days.flatMap((day) => {
    const totals = totalEnergy(intervals, day);
    if (totals.measuredRows + totals.excludedRows + totals.noReadingRows + totals.coveredS === 0)
      return [];
    const lengthS = (day.endMs - day.startMs) / 1000;
    return [{ ...day, lengthS, totals, outsideFluidRows: outsideFluidRowsOf(day) }];
  });
}

/** Puts `days` in place of what is stored for the dates `fromDate` ≤ date < `toDate`. */
export async function replaceDays(
  database: Database,
  transaction: Transaction,
  owner: { readonly organisationId: string; readonly pointId: string },
  range: { readonly fromDate: string; readonly toDate: string },
  days: readonly DayEnergy[],
): Promise<void> {
  const { organisationId, pointId } = owner;
  await database.query(
    `DELETE FROM day_energy WHERE point_id = :pointId
       AND local_date >= :fromDate AND local_date < :toDate`,
    { replacements: { pointId, ...range }, transaction },
  );
  await insertMany(
    transaction,
    insert,
    days.map((day) => rowOf(organisationId, pointId, day)),
  );
}

const selectedColumns = columns
  .map((name) => (name === "local_date" ? "CAST(local_date AS CHAR) AS local_date" : name))
  .join(", ");
const position = new Map(columns.map((name, index) => [name, index]));
const cell = (row: SqlRow, name: string) => row[position.get(name) as number] ?? null;
const number = (row: SqlRow, name: string) => Number(cell(row, name) ?? 0);
const orNull = (row: SqlRow, name: string) => {
  const value = cell(row, name);
  return value === null ? null : Number(value);
};

function registerOf(row: SqlRow, name: string): RegisterTotals {
  const part = (of: string) => number(row, `${name}_${of}`);
  return {
    energyKwh: part("kwh"),
    volumeM3: part("m3"),
    flowDeltaTM3K: part("flow_dt"),
    powerDeltaTKwhK: part("power_dt"),
    deltaTKs: part("dt"),
    runningS: part("s"),
  };
}

function dayOf(row: SqlRow): DayEnergy {
  const coveredS = number(row, "covered_s");
  const startMs = number(row, "start_ms");
  const lengthS = number(row, "length_s");
  const meterOnlyS = number(row, "meter_only_s");
  const waterS = waterSeconds({ coveredS, meterOnlyS });
  const mean = (name: string) => (waterS > 0 ? number(row, name) / waterS : null);
  return {
    date: String(cell(row, "local_date")),
    startMs,
    endMs: startMs + lengthS * 1000,
    lengthS,
    outsideFluidRows: number(row, "outside_water_rows"),
    totals: {
      coveredS,
      volumeM3: number(row, "volume_m3"),
      suppressedKwh: number(row, "suppressed_kwh"),
      suppressedS: number(row, "suppressed_s"),
      heating: registerOf(row, "heating"),
      cooling: registerOf(row, "cooling"),
      minPowerKw: orNull(row, "min_power_kw"),
      maxPowerKw: orNull(row, "max_power_kw"),
      minFlowM3PerHour: orNull(row, "min_flow"),
      maxFlowM3PerHour: orNull(row, "max_flow"),
      meanSupplyC: mean("supply_cs"),
      meanReturnC: mean("return_cs"),
      measuredRows: number(row, "measured_rows"),
      excludedRows: number(row, "excluded_rows"),
      noReadingRows: number(row, "no_reading_rows"),
      apportioned: number(row, "apportioned") === 1,
      meterOnlyS,
      againstRows: number(row, "against_rows"),
    },
  };
}

/**
 * The stored days of a point with fromDate ≤ date < toDate, ascending; days without any row are
 * absent. The point must have been found through the organisation's scope.
 */
export async function loadDays(
  database: Database,
  pointId: string,
  fromDate: string,
  toDate: string,
  transaction?: Transaction,
): Promise<DayEnergy[]> {
  const rows = await selectMany(
    database,
    `SELECT ${selectedColumns} FROM day_energy
      WHERE point_id = ? AND local_date >= ? AND local_date < ? ORDER BY day_energy.local_date`,
    [pointId, fromDate, toDate],
    transaction,
  );
  return rows.map(dayOf);
}

/** The same for several points, by point: one query. */
export async function loadDaysOf(
  database: Database,
  pointIds: readonly string[],
  fromDate: string,
  toDate: string,
): Promise<Map<string, DayEnergy[]>> {
  const byPoint = new Map<string, DayEnergy[]>();
  if (pointIds.length === 0) return byPoint;
  const rows = await selectMany(
    database,
    `SELECT ${selectedColumns} FROM day_energy
      WHERE point_id IN (${pointIds.map(() => "?").join(", ")})
        AND local_date >= ? AND local_date < ? ORDER BY day_energy.local_date`,
    [...pointIds, fromDate, toDate],
  );
  for (const row of rows) {
    const pointId = String(cell(row, "point_id"));
    byPoint.set(pointId, [...(byPoint.get(pointId) ?? []), dayOf(row)]);
  }
  return byPoint;
}
