import { QueryTypes, type Sequelize } from "sequelize";

/**
 * One row a sample, the table everybody begins with. The key is whole seconds rather than a
 * DATETIME, which makes its queries a little quicker: the peer at its best.
 */
export async function createRowTable(database: Sequelize, name: string): Promise<void> {
  await database.query(`DROP TABLE IF EXISTS ${name}`);
  await database.query(
    `CREATE TABLE ${name} (
       point_id INT UNSIGNED NOT NULL, at_s INT UNSIGNED NOT NULL,
       flow FLOAT NOT NULL, supply FLOAT NOT NULL, back FLOAT NOT NULL, power_kw FLOAT NOT NULL,
       PRIMARY KEY (point_id, at_s))`,
  );
}

const queries = {
  chart: `SELECT (at_s - :from) DIV :width AS place, AVG(flow), MAX(flow), AVG(supply), MIN(supply),
                 MAX(supply), AVG(back), MIN(back), MAX(back), AVG(power_kw)
            FROM row_table WHERE point_id = 1 AND at_s >= :from AND at_s < :to GROUP BY place`,
  hours: `SELECT at_s DIV 3600 AS place, SUM(power_kw) / 60, SUM(flow) / 60, AVG(supply), AVG(back)
            FROM row_table WHERE point_id = 1 AND at_s >= :from AND at_s < :to GROUP BY place`,
  months: `SELECT DATE_FORMAT(FROM_UNIXTIME(at_s), '%Y-%m') AS place, SUM(power_kw) / 60, SUM(flow) / 60
            FROM row_table WHERE point_id = 1 AND at_s >= :from AND at_s < :to GROUP BY place`,
} as const;

export type RowQuery = keyof typeof queries;

/** What SQL on the row table answers for the year; the caller takes the time. */
export function queryRows(
  database: Sequelize,
  query: RowQuery,
  range: { fromS: number; toS: number; columns: number },
): Promise<object[]> {
  const { fromS, toS, columns } = range;
  return database.query(queries[query], {
    replacements: { from: fromS, to: toS, width: Math.ceil((toS - fromS) / columns) },
    type: QueryTypes.SELECT,
  });
}
