import { QueryTypes } from "sequelize";
import type { Interval } from "@shared/domain/time/interval";
import type { SeriesKind } from "@shared/domain/readings/reading-columns";
import type { Database } from "@server/database/connect";
import { ChannelBit } from "@server/readings/stored-rows";

/** A file whose rows lie in a range, with what its rows are. */
export interface FileBehind {
  readonly id: string;
  readonly name: string;
  readonly sha256: string;
  /** Rows of the whole file that are stored. */
  readonly rows: number;
  readonly kind: SeriesKind | null;
  readonly meters: "water" | "power" | "counter";
}

const counters = ChannelBit.heatingCounter | ChannelBit.coolingCounter;

/** The files behind a range, in order of their first row. */
export async function filesBehind(
  database: Database,
  organisationId: string,
  pointId: string,
  range: Interval,
): Promise<FileBehind[]> {
  const rows = await database.query<{
    id: string;
    name: string;
    sha256: string;
    kind: SeriesKind | null;
    rows: string;
    channels: string;
  }>(
    `SELECT f.id, f.name, f.sha256, f.series_kind AS kind, SUM(b.row_count) AS \`rows\`,
            BIT_OR(b.channel_set) AS channels
       FROM reading_block b JOIN log_file f ON f.id = b.log_file_id
      WHERE b.point_id = :pointId AND b.organisation_id = :organisationId
      GROUP BY f.id, f.name, f.sha256, f.series_kind
     HAVING MIN(b.first_ms) < :endMs AND MAX(b.last_ms) >= :startMs
      ORDER BY MIN(b.first_ms), f.id`,
    {
      replacements: { pointId, organisationId, startMs: range.startMs, endMs: range.endMs },
      type: QueryTypes.SELECT,
    },
  );
  return rows.map(({ id, name, sha256, kind, rows: count, channels }) => ({
    id: String(id),
    name,
    sha256,
    rows: Number(count),
    kind,
    meters: metersOf(Number(channels)),
  }));
}

function metersOf(channels: number): FileBehind["meters"] {
  if ((channels & ChannelBit.power) !== 0) return "power";
  return (channels & counters) !== 0 ? "counter" : "water";
}
