import {
  INTERVAL_MS,
  type IntervalEnergyColumns,
  type RegisterColumns,
} from "@shared/domain/energy/interval-energy";
import { ROUNDING_S } from "@shared/domain/energy/totals";
import { selectMany, type SqlRow } from "@server/database/bulk";
import type { Database } from "@server/database/connect";

/** Steps of one length in a row, the first from `startMs`; whole quarter-hours. */
export interface Steps {
  readonly startMs: number;
  readonly stepMs: number;
  readonly count: number;
}

// What NULL stands for is told in interval-rows.
const covered = `IFNULL(covered_s, ${INTERVAL_MS / 1000}e0)`;
/** As `waterSeconds` has it. */
const water = `IF(meter_only_s IS NULL, ${covered},
  IF(${covered} - meter_only_s > ${ROUNDING_S}, ${covered} - meter_only_s, 0e0))`;
const running = (name: string) => `IF(${name}_kwh IS NULL, 0e0, IFNULL(${name}_s, ${covered}))`;
const deltaT = { heating: "supply_c - return_c", cooling: "return_c - supply_c" } as const;

const registerSums = (name: keyof typeof deltaT) => [
  `SUM(${name}_kwh)`,
  `SUM(${name}_m3)`,
  `SUM(${name}_flow_dt)`,
  `SUM(${name}_power_dt)`,
  `SUM(IFNULL(${name}_dt, IF(${name}_kwh IS NULL, 0e0, (${deltaT[name]}) * ${covered})))`,
  `SUM(${running(name)})`,
];

const sums = [
  `SUM(${covered})`,
  ...registerSums("heating"),
  ...registerSums("cooling"),
  "SUM(IFNULL(volume_m3, IFNULL(heating_m3, 0e0) + IFNULL(cooling_m3, 0e0)))",
  "SUM(suppressed_kwh)",
  "SUM(suppressed_s)",
  "MIN(min_power_kw)",
  "MAX(max_power_kw)",
  "MIN(min_flow)",
  "MAX(max_flow)",
  `SUM(supply_c * ${water})`,
  `SUM(return_c * ${water})`,
  // Integers would be summed as DECIMAL, which takes twice as long and arrives as text.
  "SUM(measured_rows * 1e0)",
  "SUM(excluded_rows * 1e0)",
  "SUM(no_reading_rows * 1e0)",
  "MAX(apportioned)",
  "SUM(meter_only_s)",
  "SUM(against_rows * 1e0)",
];

/**
 * What the stored quarter-hours of a point add up to in each of many equal steps, as if the steps
 * were the intervals; steps that hold none are absent. The database adds them up in a fifth of the
 * time it takes to fetch them: an hourly year is a quarter of the rows.
 */
export async function loadIntervalSums(
  database: Database,
  pointId: string,
  { startMs, stepMs, count }: Steps,
): Promise<IntervalEnergyColumns> {
  const rows = await selectMany(
    database,
    `SELECT (start_s - ?) DIV ? AS place, ${sums.join(", ")} FROM interval_energy
      WHERE point_id = ? AND start_s >= ? AND start_s < ? GROUP BY place ORDER BY place`,
    [startMs / 1000, stepMs / 1000, pointId, startMs / 1000, (startMs + count * stepMs) / 1000],
  );
  return columnsOf(rows, startMs, stepMs);
}

function columnsOf(
  rows: readonly SqlRow[],
  startMs: number,
  stepMs: number,
): IntervalEnergyColumns {
  let place = 1;
  const column = (missing: number) => {
    const values = new Float64Array(rows.length);
    const from = place++;
    for (let i = 0; i < values.length; i++) values[i] = Number(rows[i]?.[from] ?? missing);
    return values;
  };
  const register = (): RegisterColumns => ({
    energyKwh: column(0),
    volumeM3: column(0),
    flowDeltaTM3K: column(0),
    powerDeltaTKwhK: column(0),
    deltaTKs: column(0),
    runningS: column(0),
  });
  // In the order of `sums`.
  return {
    startMs: Float64Array.from(rows, ([at]) => startMs + Number(at) * stepMs),
    coveredS: column(0),
    heating: register(),
    cooling: register(),
    volumeM3: column(0),
    suppressedKwh: column(0),
    suppressedS: column(0),
    minPowerKw: column(NaN),
    maxPowerKw: column(NaN),
    minFlowM3PerHour: column(NaN),
    maxFlowM3PerHour: column(NaN),
    supplyCs: column(0),
    returnCs: column(0),
    measuredRows: column(0),
    excludedRows: column(0),
    noReadingRows: column(0),
    apportioned: Uint8Array.from(column(0)),
    meterOnlyS: column(0),
    againstRows: column(0),
  };
}
