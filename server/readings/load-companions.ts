import { QueryTypes } from "sequelize";
import type { CompanionName } from "@shared/contracts/companions";
import { companionSeries, type CompanionSeries } from "@shared/domain/readings/companion-series";
import type { CompanionChannel } from "@shared/domain/readings/reading-columns";
import type { Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { loadSources } from "./load-segments";
import { ChannelBit, COMPANION_BITS } from "./stored-rows";

/** A companion series of a point and the time its rows span. */
export interface CompanionSpan {
  readonly channel: CompanionName;
  readonly firstMs: number;
  readonly lastMs: number;
  readonly rows: number;
  readonly files: number;
}

const COLUMN_OF: Readonly<Record<CompanionName, CompanionChannel>> = {
  outdoor: "outdoorC",
  electricPower: "electricKw",
  pressure: "pressureKpa",
};
const NAMES = Object.keys(COLUMN_OF) as readonly CompanionName[];

/** The companion series a point has. It must have been found through the organisation's scope. */
export async function companionSpans(
  database: Database,
  pointId: string,
): Promise<CompanionSpan[]> {
  const rows = await database.query<{
    channels: number;
    firstMs: string;
    lastMs: string;
    rowCount: string;
    fileId: string;
  }>(
    `SELECT channel_set AS channels, log_file_id AS fileId, MIN(first_ms) AS firstMs,
            MAX(last_ms) AS lastMs, SUM(row_count) AS rowCount
       FROM reading_block WHERE point_id = :pointId AND (channel_set & ${COMPANION_BITS}) <> 0
      GROUP BY channel_set, log_file_id`,
    { replacements: { pointId }, type: QueryTypes.SELECT },
  );
  return NAMES.flatMap((channel) => {
    const holding = rows.filter(({ channels }) => (channels & ChannelBit[channel]) !== 0);
    if (holding.length === 0) return [];
    return [
      {
        channel,
        firstMs: Math.min(...holding.map(({ firstMs }) => Number(firstMs))),
        lastMs: Math.max(...holding.map(({ lastMs }) => Number(lastMs))),
        rows: holding.reduce((sum, { rowCount }) => sum + Number(rowCount), 0),
        files: new Set(holding.map(({ fileId }) => fileId)).size,
      },
    ];
  });
}

export type Companions = Readonly<Partial<Record<CompanionName, CompanionSeries>>>;

/** Companion series of a point over a range and somewhat beyond; none is read where none is asked. */
export async function loadCompanions(
  database: Database,
  pointId: string,
  channels: readonly CompanionName[],
  range: Interval,
): Promise<Companions> {
  if (channels.length === 0) return {};
  const sources = await loadSources(database, pointId, range.startMs, range.endMs);
  return Object.fromEntries(
    channels.flatMap((channel) => {
      const series = companionSeries(sources, COLUMN_OF[channel]);
      return series ? [[channel, series]] : [];
    }),
  );
}
