import { BaseError, type Transaction } from "sequelize";
import type { Database } from "./connect";

const deadlock = 1213;
const attempts = 4;

function isDeadlock(error: unknown): boolean {
  if (!(error instanceof BaseError) || !("parent" in error)) return false;
  const parent = error.parent;
  return typeof parent === "object" && parent !== null && "errno" in parent
    ? parent.errno === deadlock
    : false;
}

/**
 * Runs the work in one transaction and, where the database chose it as the victim of a deadlock,
 * again from its beginning. So the work must keep nothing outside the transaction.
 */
export async function inTransaction<Result>(
  database: Database,
  work: (transaction: Transaction) => Promise<Result>,
): Promise<Result> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await database.transaction(work);
    } catch (error) {
      if (attempt >= attempts || !isDeadlock(error)) throw error;
    }
  }
}
