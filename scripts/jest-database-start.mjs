import { startThrowAwayDatabase } from "./lib/throw-away-database.mjs";

/**
 * Jest's global set-up for the server project: one MariaDB for the whole run, its port in
 * LOOPWRIGHT_TEST_DB_PORT (user root, no password, loopback only). Set the variable yourself to
 * use one that is already running, which saves its boot while working on a single test.
 */
export default async function startDatabaseForTests() {
  if (process.env.LOOPWRIGHT_TEST_DB_PORT) return;
  const database = await startThrowAwayDatabase();
  process.env.LOOPWRIGHT_TEST_DB_PORT = String(database.port);
  globalThis.databaseForTests = database;
}
