// npm start: everything a newcomer needs, from packages to a running server.
import { claimInstallation } from "./lib/installation.mjs";
import { startLocalDatabase } from "./lib/local-database.mjs";
import { ensurePackages } from "./lib/packages.mjs";
import { runScript } from "./lib/sentence-error.mjs";
import { requireFreeServerPorts, serverArguments, serverEnvironment } from "./lib/server.mjs";
import { openSession } from "./lib/session.mjs";
import { projectRoot, readSettings } from "./lib/settings.mjs";
import { ensureWebBuild } from "./lib/web-build.mjs";

await runScript(async () => {
  const settings = readSettings();
  const session = openSession();
  try {
    const claim = await claimInstallation(settings);
    session.atEnd(claim.release);
    await requireFreeServerPorts(settings);
    await ensurePackages(session);
    const [databaseUrl] = await Promise.all([
      settings.databaseUrl ?? startLocalDatabase(session, settings),
      ensureWebBuild(session),
    ]);
    const server = session.start(process.execPath, serverArguments(), {
      cwd: projectRoot,
      env: serverEnvironment(settings, databaseUrl),
    });
    claim.noteServer(server.pid);
    return await server.ended;
  } finally {
    await session.close();
  }
});
