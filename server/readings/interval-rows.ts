import type { Transaction } from "sequelize";
import {
  ENGINE_VERSION,
  INTERVAL_MS,
  type IntervalEnergyColumns,
  type RegisterColumns,
} from "@shared/domain/energy/interval-energy";
import { waterSeconds } from "@shared/domain/energy/totals";
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
 *   suppressed_…, …_rows, apportioned, meter_only_s   0
 *   min_…, max_…         nothing is covered
 *   …_c                  no water was measured
 * Mean temperatures are kept instead of their integrals, whose size a float would round.
 */
const registerNames = ["heating", "cooling"] as const;
const registerParts = ["kwh", "m3", "flow_dt", "power_dt", "dt", "s"] as const;
type RegisterColumn = `${(typeof registerNames)[number]}_${(typeof registerParts)[number]}`;
const columns = [
  "point_id",
  "start_s",
  "covered_s",
  ...registerNames.flatMap((name) =>
    registerParts.map((part): RegisterColumn => `${name}_${part}`),
  ),
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
  "meter_only_s",
  "against_rows",
  "engine_version",
] as const;

const wholeIntervalS = INTERVAL_MS / 1000;
/** A float keeps 24 bits: what differs by less than half of the last one is the same. */
const same = (a: number, b: number) => Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), 1);

/**
 * An INSERT of the columns at these places. Where rows are replaced, the columns left out become
 * what they are in the new rows: NULL.
 */
function insertOf(used: readonly number[], replaces: boolean): string {
  const names = used.map((place) => columns[place]);
  const insert = `INSERT INTO interval_energy (${names.join(", ")})
    VALUES (${names.map(() => "?").join(", ")})`;
  if (!replaces) return insert;
  const updates = columns
    .slice(2)
    .map((name) => (names.includes(name) ? `${name} = VALUES(${name})` : `${name} = NULL`));
  return `${insert} ON DUPLICATE KEY UPDATE ${updates.join(", ")}`;
}

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
    const meterOnlyS = energy.meterOnlyS[i] as number;
    const waterS = waterSeconds({ coveredS, meterOnlyS });
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
      waterS > 0 ? (energy.supplyCs[i] as number) / waterS : null,
      waterS > 0 ? (energy.returnCs[i] as number) / waterS : null,
      some(energy.measuredRows[i] as number),
      some(energy.excludedRows[i] as number),
      some(energy.noReadingRows[i] as number),
      energy.apportioned[i] ? 1 : null,
      some(meterOnlyS),
      some(energy.againstRows[i] as number),
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
  // A chilled loop uses neither the heating register nor cut-offs: half of the columns are NULL
  // throughout, and binding them would be half of the work.
  const rows = [...rowsOf(pointId, energy)];
  const used = [...columns.keys()].filter((place) => rows.some((row) => row[place] !== null));
  await insertMany(
    transaction,
    insertOf(used, stored.length > 0),
    rows.map((row) => used.map((place) => row[place] as SqlValue)),
  );
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
    meterOnlyS: column(),
    againstRows: column(),
  };
}

/** Places in a selected row, which has every column but the point's. */
const at = Object.fromEntries(columns.slice(1).map((name, index) => [name, index])) as Record<
  Exclude<(typeof columns)[number], "point_id">,
  number
>;
const registerAt = { heating: at.heating_kwh, cooling: at.cooling_kwh } as const;

function fillRegister(
  energy: IntervalEnergyColumns,
  name: keyof typeof signs,
  i: number,
  row: SqlRow,
): void {
  const from = registerAt[name];
  if (row[from] === null) return;
  const register = energy[name];
  const covered = energy.coveredS[i] as number;
  register.energyKwh[i] = row[from] as number;
  register.volumeM3[i] = row[from + 1] as number;
  register.flowDeltaTM3K[i] = row[from + 2] as number;
  register.powerDeltaTKwhK[i] = row[from + 3] as number;
  register.deltaTKs[i] = (row[from + 4] ??
    deltaTFromMeans(
      name,
      row[at.supply_c] as number,
      row[at.return_c] as number,
      covered,
    )) as number;
  register.runningS[i] = (row[from + 5] ?? covered) as number;
}

function fillRow(energy: IntervalEnergyColumns, i: number, row: SqlRow): void {
  // FLOAT, DOUBLE and INT arrive as numbers through the binary protocol.
  const value = (index: number, otherwise: number) => (row[index] ?? otherwise) as number;
  const covered = value(at.covered_s, wholeIntervalS);
  energy.startMs[i] = value(at.start_s, NaN) * 1000;
  energy.coveredS[i] = covered;
  fillRegister(energy, "heating", i, row);
  fillRegister(energy, "cooling", i, row);
  const registersVolume =
    (energy.heating.volumeM3[i] as number) + (energy.cooling.volumeM3[i] as number);
  energy.volumeM3[i] = value(at.volume_m3, registersVolume);
  energy.suppressedKwh[i] = value(at.suppressed_kwh, 0);
  energy.suppressedS[i] = value(at.suppressed_s, 0);
  energy.minPowerKw[i] = value(at.min_power_kw, NaN);
  energy.maxPowerKw[i] = value(at.max_power_kw, NaN);
  energy.minFlowM3PerHour[i] = value(at.min_flow, NaN);
  energy.maxFlowM3PerHour[i] = value(at.max_flow, NaN);
  energy.meterOnlyS[i] = value(at.meter_only_s, 0);
  energy.againstRows[i] = value(at.against_rows, 0);
  const waterS = waterSeconds({ coveredS: covered, meterOnlyS: energy.meterOnlyS[i] as number });
  energy.supplyCs[i] = value(at.supply_c, 0) * waterS;
  energy.returnCs[i] = value(at.return_c, 0) * waterS;
  energy.measuredRows[i] = value(at.measured_rows, 0);
  energy.excludedRows[i] = value(at.excluded_rows, 0);
  energy.noReadingRows[i] = value(at.no_reading_rows, 0);
  energy.apportioned[i] = value(at.apportioned, 0);
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

/** Stretches asked for in one query; more would make it long without making it quicker. */
const mostSpans = 200;

/**
 * The same for stretches of time in ascending order, such as the nights of a year: a fifth of the
 * rows. They must not overlap.
 */
export async function loadIntervalsOf(
  database: Database,
  pointId: string,
  spans: readonly { readonly startMs: number; readonly endMs: number }[],
): Promise<IntervalEnergyColumns> {
  const rows: SqlRow[] = [];
  for (let from = 0; from < spans.length; from += mostSpans) {
    const asked = spans.slice(from, from + mostSpans);
    const seconds = asked.flatMap(({ startMs, endMs }) => [
      Math.ceil(startMs / 1000),
      Math.ceil(endMs / 1000),
    ]);
    rows.push(
      ...(await selectMany(
        database,
        `SELECT ${columns.slice(1).join(", ")} FROM interval_energy WHERE point_id = ?
            AND (${asked.map(() => "start_s >= ? AND start_s < ?").join(" OR ")}) ORDER BY start_s`,
        [pointId, ...seconds],
      )),
    );
  }
  const energy = emptyColumns(rows.length);
  rows.forEach((row, i) => fillRow(energy, i, row));
  return energy;
}
