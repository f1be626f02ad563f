/** Jest's global tear-down for the server project: stops what jest-database-start.mjs booted. */
export default async function stopDatabaseForTests() {
  await globalThis.databaseForTests?.stop();
}
