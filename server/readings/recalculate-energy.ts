import { QueryTypes, type Transaction } from "sequelize";
import { correctSegments } from "@shared/domain/readings/corrections/correct-segments";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { HOUR_MS, type Interval } from "@shared/domain/time/interval";
import { addDays, localDaysBetween, type LocalDay } from "@shared/domain/time/local-calendar";
import { INTERVAL_MS, type IntervalEnergyColumns } from "@shared/domain/energy/interval-energy";
import type { Database } from "@server/database/connect";
import { calculateEnergy } from "./calculate-energy";
import { workOutEffectsAnew } from "./correction-effects";
import { replaceDays } from "./day-rows";
import { keepEnergyResult } from "./energy-results";
import { loadEnergySettings } from "./energy-settings";
import { replaceIntervals } from "./interval-rows";
import { stretchesOf } from "./energy-stretches";
import { loadSegments, stepsOfPoint } from "./load-segments";
import { loadPointCorrections, type PointCorrections } from "./point-corrections";
import { refreshPointReadings } from "./point-readings";
import { fileSpans } from "./reading-span";

export interface RecalculationOptions {
  /**
   * The point's readings over [fromMs, toMs) where the caller has them at hand, without corrections:
   * an import that just stored them need not read them back.
   */
  readonly segmentsOf?: (fromMs: number, toMs: number) => ReadingSegment[];
  /** Called after each stretch with the share done, 0 to 1; may throw to stop the work. */
  readonly onProgress?: (share: number) => void;
}

/**
 * Works out the energy of a point anew from its stored readings, in the caller's transaction:
 * quarter-hours and local days of `range` and of the days it touches; everything without a range.
 * What no longer has readings goes. Take the point's lock first ({@link lockPoint}), so that two
 * jobs do not work on one point at a time.
 */
export async function recalculateEnergy(
  database: Database,
  transaction: Transaction,
  pointId: string,
  range: Interval | null,
  options: RecalculationOptions = {},
): Promise<void> {
  const settings = await loadEnergySettings(database, pointId, transaction);
  const { reach, shortestMs } = await stepsOfPoint(database, pointId, transaction);
  const corrections = await loadPointCorrections(database, pointId, transaction);
  // A clock that was corrected moves a file's rows out of the range its own labels name.
  const moved = [...corrections.files.values()].some(({ clock }) => clock !== null);
  const isEverything = range === null || moved;
  const whole = isEverything
    ? await rangeOfEverything(database, transaction, pointId, corrections)
    : range;
  if (whole !== null) {
    const days = localDaysBetween(
      { startMs: whole.startMs - reach, endMs: whole.endMs + reach },
      settings.zone,
    );
    const given = corrections.files.size === 0 ? options.segmentsOf : undefined;
    const segmentsOf = given
      ? (fromMs: number, toMs: number) => correctSegments(given(fromMs, toMs), corrections.segments)
      : (fromMs: number, toMs: number) =>
          loadSegments(database, pointId, fromMs, toMs, transaction, corrections);
    if (isEverything) await deleteDays(database, transaction, pointId);
    let done = 0;
    for (const stretch of stretchesOf(days, shortestMs)) {
      await recalculateStretch(database, transaction, settings, stretch, segmentsOf);
      done += stretch.length;
      options.onProgress?.(done / days.length);
    }
  }
  await refreshPointReadings(database, transaction, settings, corrections);
  await keepEnergyResult(database, transaction, settings);
  await workOutEffectsAnew(database, transaction, settings);
}

async function recalculateStretch(
  database: Database,
  transaction: Transaction,
  settings: Awaited<ReturnType<typeof loadEnergySettings>>,
  days: readonly LocalDay[],
  segmentsOf: (
    fromMs: number,
    toMs: number,
  ) => readonly ReadingSegment[] | Promise<readonly ReadingSegment[]>,
): Promise<void> {
  const first = days[0];
  const last = days[days.length - 1];
  if (!first || !last) return;
  const { pointId } = settings;
  // Days of a zone off the quarter hour would share an interval with their neighbour: none today.
  const fromMs = Math.floor(first.startMs / INTERVAL_MS) * INTERVAL_MS;
  const toMs = Math.ceil(last.endMs / INTERVAL_MS) * INTERVAL_MS;
  const energy = calculateEnergy(await segmentsOf(fromMs, toMs), settings, days);
  const intervals = energy?.intervals ?? noIntervals;
  await replaceIntervals(database, transaction, pointId, { fromMs, toMs }, intervals);
  await replaceDays(
    database,
    transaction,
    settings,
    { fromDate: first.date, toDate: addDays(last.date, 1) },
    energy?.days ?? [],
  );
}

/** From the first to the last instant that holds a reading or a figure; null where neither is. */
async function rangeOfEverything(
  database: Database,
  transaction: Transaction,
  pointId: string,
  { files }: PointCorrections,
): Promise<Interval | null> {
  const spans = await fileSpans(database, pointId, files, transaction);
  const [stored] = await database.query<{ firstS: number | null; lastS: number | null }>(
    `SELECT MIN(start_s) AS firstS, MAX(start_s) AS lastS FROM interval_energy
      WHERE point_id = :pointId`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  const figures = [stored?.firstS ?? null, stored?.lastS ?? null].flatMap((second) =>
    second === null ? [] : [second * 1000],
  );
  const instants = [...spans.flatMap(({ firstMs, lastMs }) => [firstMs, lastMs]), ...figures];
  if (instants.length === 0) return null;
  return { startMs: Math.min(...instants), endMs: Math.max(...instants) + HOUR_MS };
}

/** Days of a zone the site no longer has lie across the new ones, so all of them go. */
async function deleteDays(database: Database, transaction: Transaction, pointId: string) {
  await database.query("DELETE FROM day_energy WHERE point_id = :pointId", {
    replacements: { pointId },
    transaction,
  });
}

/**
 * Waits until no other job works on the point's readings and keeps it so until the transaction ends.
 * Must be its first statement: what is read afterwards then sees what the other job has committed.
 *
 * The lock is the row of the point's readings, made here if need be, and not the point's own row:
 * whatever refers to a point, such as opening or cancelling an import, would wait for that one.
 */
export async function lockPoint(
  database: Database,
  transaction: Transaction,
  pointId: string,
): Promise<void> {
  await database.query(
    `INSERT INTO point_readings
            (point_id, organisation_id, revision, zone, row_count, engine_version, calculated_at)
     SELECT id, organisation_id, 0, '', 0, 0, UTC_TIMESTAMP(3)
       FROM metering_point WHERE id = :pointId
     ON DUPLICATE KEY UPDATE revision = point_readings.revision`,
    { replacements: { pointId }, transaction },
  );
}

const none = new Float64Array(0);
const noRegister = {
  energyKwh: none,
  volumeM3: none,
  flowDeltaTM3K: none,
  powerDeltaTKwhK: none,
  deltaTKs: none,
  runningS: none,
};
const noIntervals: IntervalEnergyColumns = {
  startMs: none,
  coveredS: none,
  heating: noRegister,
  cooling: noRegister,
  volumeM3: none,
  suppressedKwh: none,
  suppressedS: none,
  minPowerKw: none,
  maxPowerKw: none,
  minFlowM3PerHour: none,
  maxFlowM3PerHour: none,
  supplyCs: none,
  returnCs: none,
  measuredRows: none,
  excludedRows: none,
  noReadingRows: none,
  apportioned: new Uint8Array(0),
  meterOnlyS: none,
  againstRows: none,
};
