import { QueryTypes, type Transaction } from "sequelize";
import type { CorrectionSpan } from "@shared/domain/readings/corrections/correction-span";
import type { Side } from "@shared/domain/readings/corrections/probe-offset";
import type { Database } from "@server/database/connect";

/** Where a probe sat, as standing installations say it. */
export interface ProbePlace {
  readonly pointId: string;
  readonly probeId: string;
  readonly side: Side;
  readonly span: CorrectionSpan;
}

interface Row {
  pointId: string;
  startsAt: Date;
  endsAt: Date | null;
  supplyProbeId: string | null;
  returnProbeId: string | null;
}

/**
 * Every place of every probe of a point, or of one probe over all points of an organisation. An
 * installation without an end holds until the next one of its point starts.
 */
export async function probePlaces(
  database: Database,
  of: { readonly pointId: string } | { readonly organisationId: string; readonly probeId: string },
  transaction?: Transaction,
): Promise<ProbePlace[]> {
  const standing = "superseded_at IS NULL AND withdrawn_at IS NULL";
  const where =
    "pointId" in of
      ? "point_id = :pointId"
      : `organisation_id = :organisationId AND point_id IN (
           SELECT point_id FROM installation
            WHERE :probeId IN (supply_probe_id, return_probe_id) AND ${standing})`;
  const rows = await database.query<Row>(
    `SELECT point_id AS pointId, starts_at AS startsAt, ends_at AS endsAt,
            supply_probe_id AS supplyProbeId, return_probe_id AS returnProbeId
       FROM installation WHERE ${where} AND ${standing} ORDER BY point_id, starts_at, id`,
    { replacements: { ...of }, type: QueryTypes.SELECT, transaction },
  );
  return rows
    .flatMap((row, index) => {
      const next = rows[index + 1];
      const nextMs = next?.pointId === row.pointId ? next.startsAt.getTime() : Infinity;
      const span = {
        startMs: row.startsAt.getTime(),
        endMs: Math.min(row.endsAt?.getTime() ?? Infinity, nextMs),
      };
      const place = (probeId: string | null, side: Side): ProbePlace[] =>
        probeId === null ? [] : [{ pointId: row.pointId, probeId: String(probeId), side, span }];
      return [...place(row.supplyProbeId, "supply"), ...place(row.returnProbeId, "return")];
    })
    .filter(
      ({ probeId, span }) =>
        span.startMs < span.endMs && ("probeId" in of ? probeId === of.probeId : true),
    );
}
