import startDatabaseForTests from "./jest-database-start.mjs";
import { openSession } from "./lib/session.mjs";
import { ensureWebBuild } from "./lib/web-build.mjs";

/** Jest's global set-up for browser tests: a database as for the server's, and a built client. */
export default async function prepareBrowserTests() {
  const session = openSession();
  await ensureWebBuild(session);
  await session.close();
  await startDatabaseForTests();
}
