import { QueryTypes } from "sequelize";
import type { Database } from "@server/database/connect";

/** Pages of a table on disk after InnoDB has settled, in bytes. */
async function tableBytes(database: Database, schema: string, table: string): Promise<number> {
  await database.query(`ANALYZE TABLE ${schema}.${table}`, { type: QueryTypes.SELECT });
  const [row] = await database.query<{ bytes: string }>(
    `SELECT DATA_LENGTH + INDEX_LENGTH AS bytes FROM information_schema.TABLES
      WHERE TABLE_SCHEMA = :schema AND TABLE_NAME = :table`,
    { replacements: { schema, table }, type: QueryTypes.SELECT },
  );
  return Number(row?.bytes ?? NaN);
}

/** What a sample takes in all tables that hold readings and energy, indexes and free pages included. */
export async function bytesPerSample(database: Database, schema: string): Promise<number> {
  let bytes = 0;
  for (const table of ["reading_block", "interval_energy", "day_energy"])
    bytes += await tableBytes(database, schema, table);
  const [rows] = await database.query<{ samples: string }>(
    `SELECT SUM(row_count) AS samples FROM ${schema}.reading_block`,
    { type: QueryTypes.SELECT },
  );
  return bytes / Number(rows?.samples ?? NaN);
}

/** The same of a table with a row a sample. */
export async function bytesPerRow(
  database: Database,
  schema: string,
  table: string,
): Promise<number> {
  const bytes = await tableBytes(database, schema, table);
  const [rows] = await database.query<{ samples: string }>(
    `SELECT COUNT(*) AS samples FROM ${schema}.${table}`,
    { type: QueryTypes.SELECT },
  );
  return bytes / Number(rows?.samples ?? NaN);
}
