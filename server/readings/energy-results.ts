import { createHash } from "node:crypto";
import { gunzipSync, gzipSync } from "node:zlib";
import { QueryTypes, type Transaction } from "sequelize";
import type { EnergyResult } from "@shared/contracts/corrections";
import { ENGINE_VERSION } from "@shared/domain/energy/interval-energy";
import { selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";
import { decimalNumber, instantText } from "@server/database/conversions";
import type { DayEnergy } from "./day-rows";
import { loadDays } from "./day-rows";
import type { EnergySettings } from "./energy-settings";
import { standingCorrections } from "./point-corrections";

/*
 * The table energy_result, of which this file is the only reader and writer: one row for every time a
 * point's energy was worked out, with what it came from and its days. Nothing is ever changed in it.
 */

/** What a result came from, as it is kept. */
type Inputs = Pick<EnergyResult, "point" | "loop" | "files" | "corrections">;

export interface ResultDay {
  readonly date: string;
  readonly heatingKwh: number;
  readonly coolingKwh: number;
  readonly volumeM3: number;
  readonly coveredS: number;
}

/** JSON over this many bytes is packed: a year of days stays below it. */
const plainBytes = 64 * 1024;

/** Changes with whatever of point, loop and site the energy depends on; equal settings, equal text. */
export function pointVersionOf(settings: EnergySettings): string {
  const { meterSide, service, cutOffs, pressure, loopFluid, zone, meterPlace } = settings;
  const depends = [
    meterSide,
    service,
    cutOffs.flowM3PerHour,
    cutOffs.deltaTK,
    pressure.pressureMPa,
    loopFluid.kind,
    ...(loopFluid.kind === "water" ? [] : [loopFluid.percent, loopFluid.basis]),
    zone,
    // The gap rule, and what a counter there can pass at most.
    meterPlace.gapRule,
    meterPlace.designFlowM3PerHour,
    meterPlace.designDeltaTK,
    meterPlace.insideDiameterMm,
  ];
  return createHash("sha256").update(JSON.stringify(depends)).digest("hex").slice(0, 10);
}

/**
 * Keeps what the point's energy is now, in the transaction that worked it out. Its cause is read off
 * what differs from the result before, so it is what really changed, whoever asked for the work. A
 * point that never held a reading keeps no result.
 */
export async function keepEnergyResult(
  database: Database,
  transaction: Transaction,
  settings: EnergySettings,
): Promise<void> {
  const { pointId, organisationId } = settings;
  const inputs = await inputsOf(database, transaction, settings);
  const [before] = await loadResults(database, organisationId, pointId, { most: 1, transaction });
  if (!before && inputs.files.length === 0) return;
  const days = (await loadDays(database, pointId, "0001-01-01", "9999-12-31", transaction)).map(
    resultDay,
  );
  // Rows that are all left out cover no time: what was used in it is unknown, not 0.
  const covered = days.some((day) => day.coveredS > 0);
  const sum = (of: (day: ResultDay) => number) =>
    covered ? days.reduce((total, day) => total + of(day), 0) : null;
  const json = Buffer.from(JSON.stringify(days));
  const packs = json.length > plainBytes;
  await database.query(
    `INSERT INTO energy_result (organisation_id, point_id, revision, calculated_at, cause,
            engine_version, inputs, heating_kwh, cooling_kwh, days_format, days)
     SELECT :organisationId, point_id, revision, UTC_TIMESTAMP(3), :cause, :engineVersion, :inputs,
            :heatingKwh, :coolingKwh, :format, :days
       FROM point_readings WHERE point_id = :pointId`,
    {
      replacements: {
        organisationId,
        pointId,
        cause: causeOf(before ?? null, inputs),
        engineVersion: ENGINE_VERSION,
        inputs: JSON.stringify(inputs),
        heatingKwh: sum((day) => day.heatingKwh),
        coolingKwh: sum((day) => day.coolingKwh),
        format: packs ? "gzip" : "json",
        days: packs ? gzipSync(json) : json,
      },
      transaction,
    },
  );
}

function resultDay({ date, totals }: DayEnergy): ResultDay {
  return {
    date,
    heatingKwh: totals.heating.energyKwh,
    coolingKwh: totals.cooling.energyKwh,
    volumeM3: totals.volumeM3,
    coveredS: totals.coveredS,
  };
}

async function inputsOf(
  database: Database,
  transaction: Transaction,
  settings: EnergySettings,
): Promise<Inputs> {
  const { pointId, service, loopFluid, pressure, cutOffs, meterSide } = settings;
  const files = await database.query<{ id: string; name: string; sha256: string; rows: string }>(
    `SELECT f.id, f.name, f.sha256, SUM(b.row_count) AS \`rows\`
       FROM log_file f JOIN reading_block b ON b.log_file_id = f.id
      WHERE b.point_id = :pointId GROUP BY f.id, f.name, f.sha256 ORDER BY f.id`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  const standing = await standingCorrections(database, pointId, transaction);
  return {
    point: { meterSide, version: pointVersionOf(settings) },
    loop: {
      service,
      fluid: loopFluid,
      absoluteMPa: pressure.pressureMPa,
      pressureAssumed: pressure.assumed,
      flowCutOffM3PerHour: cutOffs.flowM3PerHour,
      deltaTCutOffK: cutOffs.deltaTK,
    },
    files: files.map((file) => ({ ...file, id: String(file.id), rows: Number(file.rows) })),
    corrections: standing.map(({ id, change }) => ({ id, kind: change.kind })),
  };
}

/** What changed since the result before; where several things did, the one that weighs most. */
export function causeOf(
  before: (Inputs & Pick<EnergyResult, "engineVersion">) | null,
  now: Inputs,
): EnergyResult["cause"] {
  if (before === null) return "import";
  const ids = (list: readonly { readonly id: string }[]) => new Set(list.map(({ id }) => id));
  const lacks = (some: Set<string>, all: Set<string>) => [...some].some((id) => !all.has(id));
  const [filesBefore, files] = [ids(before.files), ids(now.files)];
  if (lacks(files, filesBefore)) return "import";
  if (lacks(filesBefore, files)) return "undo";
  const [standingBefore, standing] = [ids(before.corrections), ids(now.corrections)];
  if (lacks(standing, standingBefore)) return "correction";
  if (lacks(standingBefore, standing)) return "withdrawal";
  if (before.point.meterSide !== now.point.meterSide) return "pointChanged";
  if (JSON.stringify(before.loop) !== JSON.stringify(now.loop)) return "loopChanged";
  if (before.point.version !== now.point.version) return "pointChanged";
  return before.engineVersion === ENGINE_VERSION ? "other" : "engineChanged";
}

interface ResultRow {
  id: string;
  pointId: string;
  revision: number;
  calculatedAt: Date;
  cause: EnergyResult["cause"];
  engineVersion: number;
  inputs: string;
  heatingKwh: number | null;
  coolingKwh: number | null;
  currentRevision: number;
}

const selectResults = `SELECT r.id, r.point_id AS pointId, r.revision, r.calculated_at AS calculatedAt,
       r.cause, r.engine_version AS engineVersion, r.inputs, r.heating_kwh AS heatingKwh,
       r.cooling_kwh AS coolingKwh, p.revision AS currentRevision
  FROM energy_result r JOIN point_readings p ON p.point_id = r.point_id
 WHERE r.organisation_id = :organisationId`;

function resultOf(row: ResultRow): EnergyResult {
  const inputs = JSON.parse(row.inputs) as Inputs;
  return {
    id: String(row.id),
    revision: row.revision,
    calculatedAt: instantText(row.calculatedAt),
    cause: row.cause,
    isCurrent: row.revision === row.currentRevision,
    engineVersion: row.engineVersion,
    ...inputs,
    heatingKwh: decimalNumber(row.heatingKwh),
    coolingKwh: decimalNumber(row.coolingKwh),
  };
}

/** A point's results, newest first. */
export async function loadResults(
  database: Database,
  organisationId: string,
  pointId: string,
  { most = 1000, transaction }: { most?: number; transaction?: Transaction } = {},
): Promise<EnergyResult[]> {
  const rows = await database.query<ResultRow>(
    `${selectResults} AND r.point_id = :pointId ORDER BY r.revision DESC LIMIT :most`,
    {
      replacements: { organisationId, pointId, most },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  return rows.map(resultOf);
}

/** One result with its days; null where the organisation has no such one. */
export async function loadResult(
  database: Database,
  organisationId: string,
  id: string,
): Promise<{ result: EnergyResult; days: ResultDay[] } | null> {
  const [row] = await database.query<ResultRow>(`${selectResults} AND r.id = :id`, {
    replacements: { organisationId, id },
    type: QueryTypes.SELECT,
  });
  if (!row) return null;
  const [packed] = await selectMany(
    database,
    "SELECT days_format, days FROM energy_result WHERE organisation_id = ? AND id = ?",
    [organisationId, id],
  );
  const [format, days] = packed ?? [];
  if (!Buffer.isBuffer(days)) throw new Error(`energy result ${id} has no days`);
  const json = format === "gzip" ? gunzipSync(days) : days;
  return { result: resultOf(row), days: JSON.parse(json.toString("utf8")) as ResultDay[] };
}
