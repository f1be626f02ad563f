import { QueryTypes, type Transaction } from "sequelize";
import type { Database } from "@server/database/connect";
import type { EnergyBlock } from "@shared/contracts/energy";
import type { EnergySettings } from "./energy-settings";
import { fluidBlock } from "./fluid-block";
import { ENGINE_VERSION } from "@shared/domain/energy/interval-energy";
import { ChannelBit } from "./stored-rows";

/** What is known of a point's readings as a whole, without reading any. */
export interface PointReadings {
  /** One higher after every change of the point's readings or energy: a key for caches. */
  readonly revision: number;
  /** Rows of all files, those counted twice that two files hold. */
  readonly rowCount: number;
  readonly firstMs: number | null;
  readonly lastMs: number | null;
  readonly nominalStepMs: number | null;
  /** Why there is no energy; null where there is. */
  readonly blockedBy: EnergyBlock | null;
  readonly outsideFluidRows: number;
  readonly engineVersion: number | null;
  /** A change waits or is being worked out, so that energy is not the latest yet. */
  readonly recalculating: boolean;
}

interface Stored {
  revision: number;
  rowCount: number;
  firstMs: string | null;
  lastMs: string | null;
  nominalStepMs: number | null;
  blockedBy: EnergyBlock | null;
  outsideFluidRows: number;
  engineVersion: number;
  recalculating: number;
}

const nothingYet: PointReadings = {
  revision: 0,
  rowCount: 0,
  firstMs: null,
  lastMs: null,
  nominalStepMs: null,
  blockedBy: null,
  outsideFluidRows: 0,
  engineVersion: null,
  recalculating: false,
};

const whole = (value: string | null) => (value === null ? null : Number(value));

/** The points' state by id; a point that never held readings is absent. */
export async function loadPointReadings(
  database: Database,
  organisationId: string,
  pointIds: readonly string[],
): Promise<Map<string, PointReadings>> {
  if (pointIds.length === 0) return new Map();
  const rows = await database.query<Stored & { pointId: string }>(
    `SELECT r.point_id AS pointId, r.revision, r.row_count AS rowCount, r.first_ms AS firstMs,
            r.last_ms AS lastMs, r.nominal_step_ms AS nominalStepMs, r.blocked_by AS blockedBy,
            r.outside_water_rows AS outsideFluidRows, r.engine_version AS engineVersion,
            EXISTS (SELECT 1 FROM job j WHERE j.point_id = r.point_id AND j.kind = 'recalculate'
                      AND j.state IN ('queued', 'running')) AS recalculating
       FROM point_readings r
      WHERE r.organisation_id = :organisationId AND r.point_id IN (:pointIds)`,
    { replacements: { organisationId, pointIds: [...pointIds] }, type: QueryTypes.SELECT },
  );
  return new Map(
    rows.map((row) => [
      row.pointId,
      {
        ...row,
        firstMs: whole(row.firstMs),
        lastMs: whole(row.lastMs),
        recalculating: Number(row.recalculating) === 1,
      },
    ]),
  );
}

/** One point's state; all empty where it never held readings. */
export async function loadOnePointReadings(
  database: Database,
  organisationId: string,
  pointId: string,
): Promise<PointReadings> {
  const found = await loadPointReadings(database, organisationId, [pointId]);
  return found.get(pointId) ?? nothingYet;
}

/** Works the state out anew from blocks and days; part of every change's transaction. */
export async function refreshPointReadings(
  database: Database,
  transaction: Transaction,
  settings: EnergySettings,
): Promise<void> {
  const { pointId, organisationId, zone } = settings;
  const [blocks] = await database.query<{
    count: string;
    rowCount: string | null;
    firstMs: string | null;
    lastMs: string | null;
    channels: string;
  }>(
    `SELECT COUNT(*) AS count, SUM(row_count) AS rowCount, MIN(first_ms) AS firstMs,
            MAX(last_ms) AS lastMs, BIT_OR(channel_set) AS channels
       FROM reading_block WHERE point_id = :pointId`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  const [days] = await database.query<{ outside: string | null; measured: string | null }>(
    `SELECT SUM(outside_water_rows) AS outside, SUM(measured_rows) AS measured
       FROM day_energy WHERE point_id = :pointId`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  const [file] = await database.query<{ step: number | null }>(
    `SELECT f.nominal_step_ms AS step FROM log_file f
       JOIN reading_block b ON b.log_file_id = f.id AND (b.channel_set & ${ChannelBit.flow}) <> 0
      WHERE b.point_id = :pointId ORDER BY f.precedence DESC LIMIT 1`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  const outsideFluidRows = Number(days?.outside ?? 0);
  await database.query(
    `INSERT INTO point_readings (point_id, organisation_id, revision, zone, row_count, first_ms,
            last_ms, nominal_step_ms, blocked_by, outside_water_rows, engine_version, calculated_at)
     VALUES (:pointId, :organisationId, 1, :zone, :rowCount, :firstMs, :lastMs, :step, :blockedBy,
            :outsideFluidRows, :engineVersion, UTC_TIMESTAMP(3))
     ON DUPLICATE KEY UPDATE revision = revision + 1, zone = VALUES(zone),
       row_count = VALUES(row_count), first_ms = VALUES(first_ms), last_ms = VALUES(last_ms),
       nominal_step_ms = VALUES(nominal_step_ms), blocked_by = VALUES(blocked_by),
       outside_water_rows = VALUES(outside_water_rows),
       engine_version = VALUES(engine_version), calculated_at = VALUES(calculated_at)`,
    {
      replacements: {
        pointId,
        organisationId,
        zone,
        rowCount: Number(blocks?.rowCount ?? 0),
        firstMs: blocks?.firstMs ?? null,
        lastMs: blocks?.lastMs ?? null,
        step: file?.step ?? null,
        blockedBy: energyBlock(settings, {
          channels: Number(blocks?.count ?? 0) === 0 ? null : Number(blocks?.channels),
          measuredRows: Number(days?.measured ?? 0),
          outsideFluidRows,
        }),
        outsideFluidRows,
        engineVersion: ENGINE_VERSION,
      },
      transaction,
    },
  );
}

/** Why there is no energy: the fluid first, then what was not measured, then what was implausible. */
export function energyBlock(
  settings: Pick<EnergySettings, "fluid">,
  found: {
    /** Sum of {@link ChannelBit}; null where there is no reading at all. */
    readonly channels: number | null;
    readonly measuredRows: number;
    readonly outsideFluidRows: number;
  },
): EnergyBlock | null {
  const byFluid = fluidBlock(settings.fluid);
  if (byFluid !== null) return byFluid;
  if (found.channels === null) return null;
  if ((found.channels & ChannelBit.flow) === 0) return "noFlow";
  const temperatures = ChannelBit.supply | ChannelBit.return;
  if ((found.channels & temperatures) !== temperatures) return "noTemperature";
  return found.outsideFluidRows > 0 && found.measuredRows === 0 ? "outsideFluid" : null;
}
