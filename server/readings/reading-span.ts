import { QueryTypes, type Transaction } from "sequelize";
import { trueInstantMs } from "@shared/domain/readings/corrections/clock";
import type { Database } from "@server/database/connect";
import { READING_BITS } from "./stored-rows";
import type { FileCorrections } from "./point-corrections";

/** First and last instant of a file's rows. */
export interface FileSpan {
  readonly logFileId: string;
  readonly firstMs: number;
  readonly lastMs: number;
}

/** When the readings of each file of a point are, companion series aside,, by the clocks as they are corrected. */
export async function fileSpans(
  database: Database,
  pointId: string,
  files: ReadonlyMap<string, FileCorrections>,
  transaction?: Transaction,
): Promise<FileSpan[]> {
  const rows = await database.query<{ id: string; firstMs: string; lastMs: string }>(
    `SELECT log_file_id AS id, MIN(first_ms) AS firstMs, MAX(last_ms) AS lastMs
       FROM reading_block
      WHERE point_id = :pointId AND (channel_set & ${READING_BITS}) <> 0 GROUP BY log_file_id`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map(({ id, firstMs, lastMs }) => {
    const clock = files.get(String(id))?.clock ?? null;
    const at = (ms: string) => (clock ? trueInstantMs(Number(ms), clock) : Number(ms));
    return { logFileId: String(id), firstMs: at(firstMs), lastMs: at(lastMs) };
  });
}
