import { mkdtempSync } from "node:fs";
import { rm } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { startKeeper } from "./keeper.mjs";
import { bootDatabase, databasePlaces, initialiseDatabase, runSql } from "./mariadb.mjs";
import { freePort } from "./ports.mjs";

/**
 * Boots a MariaDB for tests in a temporary folder; stopping it removes the folder, and so does the
 * death of the process that asked for it. `root` enters over TCP without a password.
 * @returns {Promise<{port: number, pid: number, places: object, stop: () => Promise<void>}>}
 */
export async function startThrowAwayDatabase({ durable = false } = {}) {
  const folder = mkdtempSync(path.join(os.tmpdir(), "loopwright-db-"));
  const keeper = startKeeper();
  keeper.removeAtEnd(folder);
  const places = databasePlaces(folder);
  await initialiseDatabase(places);
  const port = await freePort(); // asked for last: another process may take it in between
  const database = await bootDatabase(places, port, {
    durable,
    onSpawn: ({ pid }) => keeper.watch(pid),
  });
  await runSql(
    places,
    "CREATE USER root@'127.0.0.1'; GRANT ALL ON *.* TO root@'127.0.0.1' WITH GRANT OPTION;",
  );
  return {
    port,
    pid: database.pid,
    places,
    stop: async () => {
      await database.stop();
      await rm(folder, { recursive: true, force: true });
      await keeper.release();
    },
  };
}
