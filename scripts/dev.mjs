// npm run dev: the server restarts and the client reloads as files change.
import { readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { claimInstallation } from "./lib/installation.mjs";
import { startLocalDatabase } from "./lib/local-database.mjs";
import { ensurePackages } from "./lib/packages.mjs";
import { runScript } from "./lib/sentence-error.mjs";
import { requireFreeServerPorts, serverArguments, serverEnvironment } from "./lib/server.mjs";
import { openSession } from "./lib/session.mjs";
import { projectRoot, readSettings } from "./lib/settings.mjs";
import { copyCanvasKit } from "./lib/web-build.mjs";

await runScript(async () => {
  const settings = readSettings();
  const session = openSession();
  try {
    const claim = await claimInstallation(settings);
    session.atEnd(claim.release);
    await requireFreeServerPorts(settings);
    await ensurePackages(session);
    await copyCanvasKit();
    const databaseUrl = settings.databaseUrl ?? (await startLocalDatabase(session, settings));

    // Expo's development server rewrites tsconfig's include: keep ours.
    const tsconfig = path.join(projectRoot, "tsconfig.json");
    const ours = readFileSync(tsconfig);
    session.atEnd(() => writeFileSync(tsconfig, ours));

    const env = serverEnvironment(settings, databaseUrl);
    const server = session.start(process.execPath, serverArguments({ watch: true }), {
      cwd: projectRoot,
      env,
    });
    claim.noteServer(server.pid);
    const client = session.start(
      process.execPath,
      [path.join("node_modules", "expo", "bin", "cli"), "start", "--web", "--localhost"],
      {
        cwd: projectRoot,
        env: { ...env, EXPO_OFFLINE: "1", EXPO_NO_TELEMETRY: "1", BROWSER: "none" },
      },
    );
    return await Promise.race([server.ended, client.ended]);
  } finally {
    await session.close();
  }
});
