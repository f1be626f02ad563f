import type { Transaction } from "sequelize";
import {
  ENGINE_VERSION,
  INTERVAL_MS,
  type IntervalEnergyColumns,
  type RegisterColumns,
} from "@shared/domain/energy/interval-energy";
import { insertMany, selectMany, type SqlRow, type SqlValue } from "@server/database/bulk";
import type { Database } from "@server/database/connect";

/*
 * The table interval_energy, of which this file is the only reader and writer.
 *
 * NULL stands for the usual, because InnoDB gives it no space:
 *   covered_s            the whole interval
 *   <register>_kwh…      the register did not run: all its sums are 0
 *   <register>_s         the register ran all the covered time
 *   <register>_dt        and Δθ's integral is what the mean temperatures give
 *   volume_m3            the sum of both registers' volumes
 *   suppressed_…, …_rows, apportioned   0
 *   min_…, max_…, …_c    nothing is covered
 * Mean temperatures are kept instead of their integrals, whose size a float would round.
 */
const registerNames = ["heating", "cooling"] as const;
const registerParts = ["kwh", "m3", "flow_dt", "power_dt", "dt", "s"] as const;
const columns = [
  "point_id",
  "start_s",
  "covered_s",
  ...registerNames.flatMap((name) => registerParts.map((part) => `${name}_${part}`)),
  "volume_m3",
  "suppressed_kwh",
  "suppressed_s",
  "min_power_kw",
  "max_power_kw",
  "min_flow",
  "max_flow",
  "supply_c",
  "return_c",
  "measured_rows",
  "excluded_rows",
  "no_reading_rows",
  "apportioned",
  "engine_version",
] as const;

const wholeIntervalS = INTERVAL_MS / 1000;
/** A float keeps 24 bits: what differs by less than half of the last one is the same. */
const same = (a: number, b: number) => Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), 1);

const insert = `INSERT INTO interval_energy (${columns.join(", ")})
  VALUES (${columns.map(() => "?").join(", ")})
  ON DUPLICATE KEY UPDATE ${columns
    .slice(2)
    .map((name) => `${name} = VALUES(${name})`)
    .join(", ")}`;

const some = (value: number): number | null => (value === 0 || Number.isNaN(value) ? null : value);
const known = (value: number): number | null => (Number.isNaN(value) ? null : value);

/** Heating counts supply − return, cooling the reverse. */
const signs = { heating: 1, cooling: -1 } as const;

/** ∫Δθ dt of a register that ran all the covered time, from what is stored of the temperatures. */
function deltaTFromMeans(name: keyof typeof signs, supplyC: number, returnC: number, s: number) {
  return signs[name] * (Math.fround(supplyC) - Math.fround(returnC)) * s;
}

function registerValues(
  energy: IntervalEnergyColumns,
  name: keyof typeof signs,
  i: number,
  coveredS: number,
): SqlValue[] {
  const register = energy[name];
  const runningS = register.runningS[i] as number;
  if (runningS === 0) return [null, null, null, null, null, null];
  const deltaTKs = register.deltaTKs[i] as number;
  const supplyC = (energy.supplyCs[i] as number) / coveredS;
  const returnC = (energy.returnCs[i] as number) / coveredS;
  const isWhole = same(runningS, coveredS);
  const derived = deltaTFromMeans(name, supplyC, returnC, coveredS);
  return [
    register.energyKwh[i] as number,
    register.volumeM3[i] as number,
    register.flowDeltaTM3K[i] as number,
    register.powerDeltaTKwhK[i] as number,
    isWhole && Math.abs(derived - deltaTKs) <= 2e-6 * Math.abs(deltaTKs) ? null : deltaTKs,
    isWhole ? null : runningS,
  ];
}

function* rowsOf(pointId: string, energy: IntervalEnergyColumns): Generator<SqlValue[]> {
  for (let i = 0; i < energy.startMs.length; i++) {
    const coveredS = energy.coveredS[i] as number;
    const volume = energy.volumeM3[i] as number;
    const registersVolume =
      (energy.heating.volumeM3[i] as number) + (energy.cooling.volumeM3[i] as number);
    yield [
      pointId,
      (energy.startMs[i] as number) / 1000,
      same(coveredS, wholeIntervalS) ? null : coveredS,
      ...registerValues(energy, "heating", i, coveredS),
      ...registerValues(energy, "cooling", i, coveredS),
      same(volume, registersVolume) ? null : volume,
      some(energy.suppressedKwh[i] as number),
      some(energy.suppressedS[i] as number),
      known(energy.minPowerKw[i] as number),
      known(energy.maxPowerKw[i] as number),
      known(energy.minFlowM3PerHour[i] as number),
      known(energy.maxFlowM3PerHour[i] as number),
      coveredS > 0 ? (energy.supplyCs[i] as number) / coveredS : null,
      coveredS > 0 ? (energy.returnCs[i] as number) / coveredS : null,
      some(energy.measuredRows[i] as number),
      some(energy.excludedRows[i] as number),
      some(energy.noReadingRows[i] as number),
      energy.apportioned[i] ? 1 : null,
      ENGINE_VERSION,
    ];
  }
}

/**
 * Puts the intervals of `fromMs` ≤ start < `toMs` in place of those stored there. Both ends must be
 * multiples of the interval; `energy` must hold nothing outside them.
 */
export async function replaceIntervals(
  database: Database,
  transaction: Transaction,
  pointId: string,
  range: { readonly fromMs: number; readonly toMs: number },
  energy: IntervalEnergyColumns,
): Promise<void> {
  const stored = await selectMany(
    database,
    "SELECT start_s FROM interval_energy WHERE point_id = ? AND start_s >= ? AND start_s < ?",
    [pointId, range.fromMs / 1000, range.toMs / 1000],
    transaction,
  );
  const kept = new Set(Array.from(energy.startMs, (ms) => ms / 1000));
  const stale = stored.map(([startS]) => Number(startS)).filter((startS) => !kept.has(startS));
  for (let from = 0; from < stale.length; from += 5_000) {
    await database.query(
      "DELETE FROM interval_energy WHERE point_id = :pointId AND start_s IN (:starts)",
      { replacements: { pointId, starts: stale.slice(from, from + 5_000) }, transaction },
    );
  }
  await insertMany(transaction, insert, rowsOf(pointId, energy));
}

function emptyRegister(count: number): RegisterColumns {
  return {
    energyKwh: new Float64Array(count),
    volumeM3: new Float64Array(count),
    flowDeltaTM3K: new Float64Array(count),
    powerDeltaTKwhK: new Float64Array(count),
    deltaTKs: new Float64Array(count),
    runningS: new Float64Array(count),
  };
}

function emptyColumns(count: number): IntervalEnergyColumns {
  const column = () => new Float64Array(count);
  return {
    startMs: column(),
    coveredS: column(),
    heating: emptyRegister(count),
    cooling: emptyRegister(count),
    volumeM3: column(),
    suppressedKwh: column(),
    suppressedS: column(),
    minPowerKw: column(),
    maxPowerKw: column(),
    minFlowM3PerHour: column(),
    maxFlowM3PerHour: column(),
    supplyCs: column(),
    returnCs: column(),
    measuredRows: column(),
    excludedRows: column(),
    noReadingRows: column(),
    apportioned: new Uint8Array(count),
  };
}

function fillRegister(
  energy: IntervalEnergyColumns,
  name: keyof typeof signs,
  i: number,
  row: SqlRow,
): void {
  const from = at(`${name}_kwh`);
  if (row[from] === null) return;
  const register = energy[name];
  const covered = energy.coveredS[i] as number;
  register.energyKwh[i] = Number(row[from]);
  register.volumeM3[i] = Number(row[from + 1]);
  register.flowDeltaTM3K[i] = Number(row[from + 2]);
  register.powerDeltaTKwhK[i] = Number(row[from + 3]);
  register.deltaTKs[i] = Number(
    row[from + 4] ??
      deltaTFromMeans(name, Number(row[at("supply_c")]), Number(row[at("return_c")]), covered),
  );
  register.runningS[i] = Number(row[from + 5] ?? covered);
}

const position = new Map<string, number>(columns.slice(1).map((name, index) => [name, index]));
const at = (name: (typeof columns)[number]): number => position.get(name) as number;

function fillRow(energy: IntervalEnergyColumns, i: number, row: SqlRow): void {
  const orZero = (name: (typeof columns)[number]) => Number(row[at(name)] ?? 0);
  const orNaN = (name: (typeof columns)[number]) => Number(row[at(name)] ?? NaN);
  const covered = Number(row[at("covered_s")] ?? wholeIntervalS);
  energy.startMs[i] = Number(row[at("start_s")]) * 1000;
  energy.coveredS[i] = covered;
  fillRegister(energy, "heating", i, row);
  fillRegister(energy, "cooling", i, row);
  const registersVolume =
    (energy.heating.volumeM3[i] as number) + (energy.cooling.volumeM3[i] as number);
  energy.volumeM3[i] = Number(row[at("volume_m3")] ?? registersVolume);
  energy.suppressedKwh[i] = orZero("suppressed_kwh");
  energy.suppressedS[i] = orZero("suppressed_s");
  energy.minPowerKw[i] = orNaN("min_power_kw");
  energy.maxPowerKw[i] = orNaN("max_power_kw");
  energy.minFlowM3PerHour[i] = orNaN("min_flow");
  energy.maxFlowM3PerHour[i] = orNaN("max_flow");
  energy.supplyCs[i] = orZero("supply_c") * covered;
  energy.returnCs[i] = orZero("return_c") * covered;
  energy.measuredRows[i] = orZero("measured_rows");
  energy.excludedRows[i] = orZero("excluded_rows");
  energy.noReadingRows[i] = orZero("no_reading_rows");
  energy.apportioned[i] = orZero("apportioned");
}

/**
 * The stored quarter-hours of a point that start in [fromMs, toMs), ascending. The point must have
 * been found through the organisation's scope: the table itself names no organisation.
 */
export async function loadIntervals(
  database: Database,
  pointId: string,
  fromMs: number,
  toMs: number,
  transaction?: Transaction,
): Promise<IntervalEnergyColumns> {
  const rows = await selectMany(
    database,
    `SELECT ${columns.slice(1).join(", ")} FROM interval_energy
      WHERE point_id = ? AND start_s >= ? AND start_s < ? ORDER BY start_s`,
    [pointId, Math.ceil(fromMs / 1000), Math.ceil(toMs / 1000)],
    transaction,
  );
  const energy = emptyColumns(rows.length);
  rows.forEach((row, i) => fillRow(energy, i, row));
  return energy;
}
