import { QueryTypes } from "sequelize";
import type { LoopService } from "@shared/contracts/places";
import type { Database } from "@server/database/connect";

/** A point on which an instrument was or is installed, by versions that stand. */
export interface InstrumentPlacement {
  readonly instrumentId: string;
  readonly installationId: string;
  readonly siteId: string;
  readonly siteName: string;
  readonly loopId: string;
  readonly loopTag: string;
  readonly service: LoopService;
  readonly pointId: string;
  readonly pointCode: string;
  readonly zone: string;
  readonly startsAt: Date;
  /** Where it ends by itself or by the next installation of the point. */
  readonly endsAt: Date | null;
}

/** Where instruments have been, newest first; one query for a list of them. */
export async function placementsOf(
  database: Database,
  organisationId: string,
  instrumentIds: readonly string[],
): Promise<Map<string, InstrumentPlacement[]>> {
  const byInstrument = new Map<string, InstrumentPlacement[]>();
  if (instrumentIds.length === 0) return byInstrument;
  const rows = await database.query<InstrumentPlacement>(
    `SELECT k.id AS instrumentId, i.id AS installationId, s.id AS siteId, s.name AS siteName,
            s.zone AS zone, l.id AS loopId, l.tag AS loopTag, l.service AS service,
            p.id AS pointId, p.code AS pointCode, i.starts_at AS startsAt,
            LEAST(COALESCE(i.ends_at, n.next_at), COALESCE(n.next_at, i.ends_at)) AS endsAt
       FROM (SELECT standing.*, LEAD(starts_at) OVER (PARTITION BY point_id ORDER BY starts_at)
                    AS next_at
               FROM installation standing
              WHERE organisation_id = :organisationId
                AND superseded_at IS NULL AND withdrawn_at IS NULL) n
       JOIN installation i ON i.id = n.id
       JOIN instrument k ON k.id IN (i.flow_meter_id, i.logger_id, i.supply_probe_id,
                                     i.return_probe_id)
       JOIN metering_point p ON p.id = i.point_id
       JOIN \`loop\` l ON l.id = p.loop_id
       JOIN site s ON s.id = l.site_id
      WHERE k.organisation_id = :organisationId AND k.id IN (:ids)
      ORDER BY i.starts_at DESC, i.id DESC`,
    {
      replacements: { organisationId, ids: [...instrumentIds] },
      type: QueryTypes.SELECT,
    },
  );
  for (const row of rows) {
    const id = String(row.instrumentId);
    const list = byInstrument.get(id) ?? [];
    list.push(row);
    byInstrument.set(id, list);
  }
  return byInstrument;
}
