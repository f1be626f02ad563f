import { QueryTypes, type Transaction } from "sequelize";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import type { FilledQuarter } from "@shared/domain/energy/fills/fill";
import type { Interval } from "@shared/domain/time/interval";
import { insertMany, selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";

/*
 * Quarter-hours of fills, kept apart from interval_energy so that no measured figure can hold one.
 * Where readings came in after a fill was made, only the part they leave open counts.
 */

/** What stands filled in a stretch of time: proposals and approved fills together. */
export interface FilledTotals {
  readonly heatingKwh: number;
  readonly coolingKwh: number;
  /**
   * Their ±, k = 2. Fills of one point are made from the same readings, so theirs are added up
   * straight, which is the cautious side.
   */
  readonly heatingExpandedKwh: number;
  readonly coolingExpandedKwh: number;
  /** Null where a fill knows none. */
  readonly volumeM3: number | null;
  readonly filledS: number;
  /** False where a proposal that nobody approved is among them. */
  readonly approvedOnly: boolean;
}

export async function storeFillQuarters(
  transaction: Transaction,
  fillId: string,
  quarters: readonly FilledQuarter[],
): Promise<void> {
  await insertMany(
    transaction,
    `INSERT INTO energy_fill_interval (fill_id, start_s, filled_s, heating_kwh, cooling_kwh, volume_m3)
     VALUES (?, ?, ?, ?, ?, ?)`,
    quarters.map(({ startMs, filledS, heatingKwh, coolingKwh, volumeM3 }) => [
      fillId,
      startMs / 1000,
      filledS,
      heatingKwh,
      coolingKwh,
      volumeM3,
    ]),
  );
}

/** Standing fills' quarter-hours with the share of each that readings still leave open. */
const standingOf = (points: number) => `
  FROM energy_fill_interval q
  JOIN energy_fill f ON f.id = q.fill_id
  LEFT JOIN interval_energy i ON i.point_id = f.point_id AND i.start_s = q.start_s
 WHERE f.point_id IN (${Array<string>(points).fill("?").join(", ")}) AND f.state <> 'withdrawn' AND q.start_s >= ? AND q.start_s < ?`;
const standing = standingOf(1);
// A stored quarter-hour without covered seconds is covered whole; half a second short is whole.
const coveredS = "IF(i.start_s IS NULL, 0, COALESCE(i.covered_s, 900))";
const openS = `IF(${coveredS} >= 899.5, 0, 900 - ${coveredS})`;
const share = `LEAST(1, ${openS} / q.filled_s)`;

/** Totals of what is filled in [start, end); null where nothing is. */
export async function filledTotals(
  database: Database,
  pointId: string,
  { startMs, endMs }: Interval,
): Promise<FilledTotals | null> {
  const [row] = await selectMany(
    database,
    `SELECT SUM(q.heating_kwh * ${share}), SUM(q.cooling_kwh * ${share}),
            SUM(q.volume_m3 * ${share}), SUM(q.filled_s * ${share}),
            SUM(q.volume_m3 IS NULL), SUM(f.state = 'proposed'),
            SUM(2 * f.uncertainty_percent / 100 * q.heating_kwh * ${share}),
            SUM(2 * f.uncertainty_percent / 100 * q.cooling_kwh * ${share}) ${standing}`,
    [pointId, startMs / 1000, endMs / 1000],
  );
  const [heatingKwh, coolingKwh, volumeM3, filledS, withoutVolume, proposed, heating, cooling] =
    row ?? [];
  if (filledS === null || filledS === undefined || Number(filledS) === 0) return null;
  return {
    heatingKwh: Number(heatingKwh),
    coolingKwh: Number(coolingKwh),
    heatingExpandedKwh: Number(heating),
    coolingExpandedKwh: Number(cooling),
    volumeM3: Number(withoutVolume) > 0 ? null : Number(volumeM3),
    filledS: Number(filledS),
    approvedOnly: Number(proposed) === 0,
  };
}

export interface FilledStretch extends Interval {
  readonly filledS: number;
}

/** The filled quarter-hours of [start, end), those that follow one another as one stretch. */
export async function filledStretches(
  database: Database,
  pointId: string,
  range: Interval,
): Promise<FilledStretch[]> {
  return (await filledStretchesOf(database, [pointId], range)).get(pointId) ?? [];
}

/** The same for several points, by point; a point without fills is left out. */
export async function filledStretchesOf(
  database: Database,
  pointIds: readonly string[],
  { startMs, endMs }: Interval,
): Promise<Map<string, FilledStretch[]>> {
  const byPoint = new Map<string, FilledStretch[]>();
  if (pointIds.length === 0) return byPoint;
  const rows = await selectMany(
    database,
    `SELECT f.point_id, q.start_s, q.filled_s * ${share} ${standingOf(pointIds.length)}
      ORDER BY f.point_id, q.start_s`,
    [...pointIds, Math.floor(startMs / INTERVAL_MS) * (INTERVAL_MS / 1000), endMs / 1000],
  );
  for (const [pointId, startS, filled] of rows) {
    const filledS = Number(filled);
    if (filledS <= 0) continue;
    const stretches = byPoint.get(String(pointId)) ?? [];
    byPoint.set(String(pointId), stretches);
    const at = Number(startS) * 1000;
    const last = stretches.at(-1);
    if (last?.endMs === at)
      stretches[stretches.length - 1] = {
        ...last,
        endMs: at + INTERVAL_MS,
        filledS: last.filledS + filledS,
      };
    else stretches.push({ startMs: at, endMs: at + INTERVAL_MS, filledS });
  }
  return byPoint;
}

/** Whether a standing fill of the point reaches into [start, end). */
export async function isFilled(
  database: Database,
  pointId: string,
  { startMs, endMs }: Interval,
  transaction: Transaction,
): Promise<boolean> {
  const [row] = await database.query<{ found: number }>(
    `SELECT EXISTS (SELECT 1 FROM energy_fill WHERE point_id = :pointId AND state <> 'withdrawn'
       AND from_ms < :endMs AND to_ms > :startMs) AS found`,
    {
      replacements: { pointId, startMs, endMs },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  return Number(row?.found) === 1;
}
