import { QueryTypes, type Transaction } from "sequelize";
import type { Database } from "@server/database/connect";
import { wholeNumber } from "@server/database/conversions";

/** A point that cannot simply disappear: readings, a log file or evidence hang on it. */
export interface PointHolding {
  readonly siteId: string;
  readonly loopId: string;
  readonly pointId: string;
  /** False where no row counts: only evidence is held, or every import was undone. */
  readonly hasReadings: boolean;
}

interface Row {
  siteId: string;
  loopId: string;
  pointId: string;
  rowCount: string | number | null;
}

const columnOf = { site: "l.site_id", loop: "p.loop_id", point: "p.id" } as const;

/** Points of the given sites, loops or points that hold any of it; one query for a list. */
export async function pointHoldings(
  database: Database,
  organisationId: string,
  of: keyof typeof columnOf,
  ids: readonly string[],
  transaction?: Transaction,
): Promise<PointHolding[]> {
  if (ids.length === 0) return [];
  const rows = await database.query<Row>(
    `SELECT l.site_id AS siteId, p.loop_id AS loopId, p.id AS pointId, r.row_count AS rowCount
     FROM metering_point p
     JOIN \`loop\` l ON l.id = p.loop_id
     LEFT JOIN point_readings r ON r.point_id = p.id
     WHERE p.organisation_id = :organisationId AND ${columnOf[of]} IN (:ids)
       AND (r.row_count > 0 OR EXISTS (SELECT 1 FROM log_import i WHERE i.point_id = p.id)
            OR EXISTS (SELECT 1 FROM installation e WHERE e.point_id = p.id))`,
    { replacements: { organisationId, ids }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map((row) => ({
    siteId: String(row.siteId),
    loopId: String(row.loopId),
    pointId: String(row.pointId),
    hasReadings: row.rowCount !== null && wholeNumber(row.rowCount) > 0,
  }));
}
