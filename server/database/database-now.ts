import { QueryTypes, type Transaction } from "sequelize";
import type { Database } from "./connect";

/** Workers keep no clock of their own: the database's is everybody's. */
export async function databaseNow(database: Database, transaction: Transaction): Promise<Date> {
  const [row] = await database.query<{ ms: string | number }>(
    "SELECT ROUND(UNIX_TIMESTAMP(NOW(3)) * 1000) AS ms",
    { type: QueryTypes.SELECT, transaction },
  );
  return new Date(Number(row?.ms));
}
