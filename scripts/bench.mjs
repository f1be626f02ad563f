// npm run bench: our import and reads against what a practitioner would use instead, as ratios.
import path from "node:path";
import { ensureMariadb } from "./lib/debian.mjs";
import { ensurePackages } from "./lib/packages.mjs";
import { runScript } from "./lib/sentence-error.mjs";
import { openSession } from "./lib/session.mjs";
import { projectRoot } from "./lib/settings.mjs";
import { startThrowAwayDatabase } from "./lib/throw-away-database.mjs";
import { ensureWebBuild } from "./lib/web-build.mjs";

await runScript(async () => {
  const session = openSession();
  try {
    await ensurePackages(session);
    await ensureMariadb(session);
    await ensureWebBuild(session);
    // Durable, as in real use: a bench on a database that never syncs would flatter us.
    const database = await startThrowAwayDatabase({ durable: true });
    session.atEnd(database.stop);
    const { code } = await session.run(
      process.execPath,
      [
        "--expose-gc",
        "--import",
        "tsx",
        path.join("test", "bench", "main.ts"),
        ...process.argv.slice(2),
      ],
      {
        cwd: projectRoot,
        show: true,
        env: { ...process.env, LOOPWRIGHT_TEST_DB_PORT: String(database.port) },
      },
    );
    return code;
  } finally {
    await session.close();
  }
});
