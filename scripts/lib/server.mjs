import path from "node:path";
import { isPortTaken } from "./ports.mjs";
import { SentenceError } from "./sentence-error.mjs";
import { projectRoot } from "./settings.mjs";

/** @throws SentenceError when another program holds the port that `variable` chooses. */
export async function requireFreePort(port, variable) {
  if (!(await isPortTaken(port))) return;
  throw new SentenceError(
    `Port ${port} is in use by another program: stop it, or set ${variable} to a free port.`,
  );
}

export async function requireFreeServerPorts(settings) {
  await requireFreePort(settings.port, "LOOPWRIGHT_PORT");
  if (!settings.usesOwnMail) await requireFreePort(settings.mailPort, "LOOPWRIGHT_MAIL_PORT");
}

/** Node's arguments for running the server, with or without restarting it on changes. */
export function serverArguments({ watch = false } = {}) {
  const main = path.join(projectRoot, "server", "main.ts");
  const tsx = path.join(projectRoot, "node_modules", "tsx", "dist", "cli.mjs");
  return watch
    ? [tsx, "watch", "--clear-screen=false", "--include", "shared/**/*", main]
    : ["--import", "tsx", main];
}

/** The server's environment: what the caller set, completed by what the scripts decided. */
export function serverEnvironment(settings, databaseUrl, base = process.env) {
  return {
    ...base,
    NODE_ENV: settings.mode === "production" ? "production" : (base.NODE_ENV ?? "development"),
    LOOPWRIGHT_MODE: settings.mode,
    LOOPWRIGHT_PORT: String(settings.port),
    LOOPWRIGHT_MAIL_PORT: String(settings.mailPort),
    LOOPWRIGHT_DATA_DIR: settings.dataFolder,
    LOOPWRIGHT_DATABASE_URL: databaseUrl,
  };
}
