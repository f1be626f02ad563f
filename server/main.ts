import { createServer, type Server } from "node:http";
import { pino } from "pino";
import { createApp } from "./app";
import { systemClock } from "./clock";
import { ConfigError, loadConfig, type Config } from "./config";
import { closeServices, createServices } from "./create-services";
import { connectDatabase } from "./database/connect";
import { migrate } from "./database/migrate";
import type { Services } from "./services";
import { welcomeLines } from "./start-up/print-welcome";
import { backgroundServices, startUpTasks } from "./start-up/tasks";

/** Requests under way get this long to finish when the server is told to stop. */
const graceMs = 10_000;

async function prepare(config: Config): Promise<Services> {
  const log = pino({ level: config.logLevel });
  const database = connectDatabase(config.databaseUrl);
  const steps = await migrate(database);
  if (steps.length > 0) log.info({ steps }, "the database was brought up to date");
  return createServices({ config, database, clock: systemClock, log });
}

async function startBackground(services: Services): Promise<{ stop(): Promise<void> }[]> {
  const running = [];
  for (const service of backgroundServices) {
    const started = await service.start(services);
    if (started !== null) running.push(started);
  }
  return running;
}

/** On loopback outside production: a demo with passwords on a screen is for this machine only. */
function listen(server: Server, { port, mode }: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once("error", reject);
    server.listen(port, mode === "production" ? "0.0.0.0" : "127.0.0.1", resolve);
  });
}

function closeServer(server: Server): Promise<void> {
  const cut = setTimeout(() => server.closeAllConnections(), graceMs);
  return new Promise((resolve) => {
    server.close(() => {
      clearTimeout(cut);
      resolve();
    });
    server.closeIdleConnections();
  });
}

async function main(): Promise<void> {
  const services = await prepare(loadConfig(process.env));
  for (const task of startUpTasks) await task.run(services);
  const background = await startBackground(services);
  const server = createServer(createApp(services));
  await listen(server, services.config);
  for (const line of await welcomeLines(services)) console.log(line);

  let stopping = false;
  const stop = async (signal: string) => {
    if (stopping) return;
    stopping = true;
    services.log.info({ signal }, "stopping");
    await closeServer(server);
    for (const service of background.reverse()) await service.stop();
    await closeServices(services);
    process.exit(0);
  };
  const stopOn = (signal: "SIGTERM" | "SIGINT") =>
    process.on(signal, () => {
      stop(signal).catch((error: unknown) => {
        services.log.error({ err: error }, "stopping failed");
        process.exit(1);
      });
    });
  stopOn("SIGTERM");
  stopOn("SIGINT");
}

main().catch((error: unknown) => {
  if (error instanceof ConfigError) for (const line of error.sentences) console.error(line);
  else console.error(error);
  process.exit(1);
});
