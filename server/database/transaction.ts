import { BaseError, type Transaction } from "sequelize";
import type { Database } from "./connect";

const deadlock = 1213;
const attempts = 4;

function errnoOf(error: unknown): unknown {
  return typeof error === "object" && error !== null && "errno" in error ? error.errno : undefined;
}

/** As Sequelize wraps it, or as the connector throws it where rows go in or out in bulk. */
function isDeadlock(error: unknown): boolean {
  const cause = error instanceof BaseError && "parent" in error ? error.parent : error;
  return errnoOf(cause) === deadlock;
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
