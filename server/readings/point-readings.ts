import { QueryTypes, type Transaction } from "sequelize";
import type { Database } from "@server/database/connect";
import type { EnergyBlock } from "@shared/contracts/energy";
import type { EnergySettings } from "./energy-settings";
import { fluidBlock } from "./fluid-block";
import { ENGINE_VERSION } from "@shared/domain/energy/interval-energy";
import type { PointCorrections } from "./point-corrections";
import { fileSpans } from "./reading-span";
import { ChannelBit, READING_BITS } from "./stored-rows";

/** Channels of a permanent meter that say how much heat moved. */
const meteredChannels = ChannelBit.power | ChannelBit.heatingCounter | ChannelBit.coolingCounter;
/** Channels whose file gives a point's readings their step. */
const leadingChannels = ChannelBit.flow | ChannelBit.volumeCounter | meteredChannels;

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
  /** The logger stored only means of flow and temperatures. */
  readonly meansOnly: boolean;
  /** Rows of a meter's power against the register of the loop's service. */
  readonly againstRows: number;
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
  meansOnly: number;
  againstRows: number;
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
  meansOnly: false,
  againstRows: 0,
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
            r.outside_water_rows AS outsideFluidRows,
            r.means_only AS meansOnly, r.against_rows AS againstRows, r.engine_version AS engineVersion,
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
        meansOnly: Number(row.meansOnly) === 1,
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
  corrections: PointCorrections,
): Promise<void> {
  const { pointId, organisationId, zone } = settings;
  const spans = await fileSpans(database, pointId, corrections.files, transaction);
  const [blocks] = await database.query<{
    count: string;
    rowCount: string | null;
    channels: string;
  }>(
    `SELECT COUNT(*) AS count, SUM(row_count) AS rowCount, BIT_OR(channel_set) AS channels
       FROM reading_block WHERE point_id = :pointId AND (channel_set & ${READING_BITS}) <> 0`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  const [days] = await database.query<{
    outside: string | null;
    measured: string | null;
    against: string | null;
  }>(
    `SELECT SUM(outside_water_rows) AS outside, SUM(measured_rows) AS measured,
            SUM(against_rows) AS against
       FROM day_energy WHERE point_id = :pointId`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  const [file] = await database.query<{ step: number | null }>(
    `SELECT f.nominal_step_ms AS step FROM log_file f
       JOIN reading_block b ON b.log_file_id = f.id AND (b.channel_set & ${leadingChannels}) <> 0
      WHERE b.point_id = :pointId ORDER BY f.precedence DESC LIMIT 1`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  // A counter's step is a mean as well. A meter that forms the power itself has lost nothing.
  const [kinds] = await database.query<{ meansOnly: number | null }>(
    `SELECT MIN(f.series_kind <> 'instantaneous'
                OR (b.channel_set & ${ChannelBit.volumeCounter}) <> 0) AS meansOnly
       FROM log_file f JOIN reading_block b ON b.log_file_id = f.id
      WHERE b.point_id = :pointId AND (b.channel_set & ${meteredChannels}) = 0
        AND (b.channel_set & ${leadingChannels}) <> 0`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  const outsideFluidRows = Number(days?.outside ?? 0);
  await database.query(
    `INSERT INTO point_readings (point_id, organisation_id, revision, zone, row_count, first_ms,
            last_ms, nominal_step_ms, blocked_by, outside_water_rows, means_only, against_rows,
            engine_version, calculated_at)
     VALUES (:pointId, :organisationId, 1, :zone, :rowCount, :firstMs, :lastMs, :step, :blockedBy,
            :outsideFluidRows, :meansOnly, :againstRows, :engineVersion, UTC_TIMESTAMP(3))
     ON DUPLICATE KEY UPDATE revision = revision + 1, zone = VALUES(zone),
       row_count = VALUES(row_count), first_ms = VALUES(first_ms), last_ms = VALUES(last_ms),
       nominal_step_ms = VALUES(nominal_step_ms), blocked_by = VALUES(blocked_by),
       outside_water_rows = VALUES(outside_water_rows), means_only = VALUES(means_only),
       against_rows = VALUES(against_rows),
       engine_version = VALUES(engine_version), calculated_at = VALUES(calculated_at)`,
    {
      replacements: {
        pointId,
        organisationId,
        zone,
        rowCount: Number(blocks?.rowCount ?? 0),
        firstMs: spans.length === 0 ? null : Math.min(...spans.map(({ firstMs }) => firstMs)),
        lastMs: spans.length === 0 ? null : Math.max(...spans.map(({ lastMs }) => lastMs)),
        step: file?.step ?? null,
        blockedBy: energyBlock(settings, {
          channels: Number(blocks?.count ?? 0) === 0 ? null : Number(blocks?.channels),
          measuredRows: Number(days?.measured ?? 0),
          outsideFluidRows,
        }),
        outsideFluidRows,
        meansOnly: Number(kinds?.meansOnly ?? 0),
        againstRows: Number(days?.against ?? 0),
        engineVersion: ENGINE_VERSION,
      },
      transaction,
    },
  );
}

/** Why there is no energy: the fluid first, then what was not measured, then what was implausible. */
export function energyBlock(
  settings: Pick<EnergySettings, "fluid" | "meterPlace">,
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
  if ((found.channels & meteredChannels) !== 0) {
    const isOpen =
      settings.meterPlace.service === "changeover" && (found.channels & ChannelBit.power) !== 0;
    return isOpen && found.measuredRows === 0 ? "powerRegister" : null;
  }
  if ((found.channels & (ChannelBit.flow | ChannelBit.volumeCounter)) === 0) return "noFlow";
  const temperatures = ChannelBit.supply | ChannelBit.return;
  if ((found.channels & temperatures) !== temperatures) return "noTemperature";
  return found.outsideFluidRows > 0 && found.measuredRows === 0 ? "outsideFluid" : null;
}
