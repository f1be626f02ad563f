import { spawn, type ChildProcess } from "node:child_process";
import { mkdtempSync } from "node:fs";
import { rm } from "node:fs/promises";
import net from "node:net";
import os from "node:os";
import path from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { freshDatabase } from "@server/testing/fresh-database";

const projectRoot = path.join(__dirname, "..", "..", "..");

export interface Application {
  /** Where the browser finds it, such as http://localhost:41234, without a slash at the end. */
  readonly address: string;
  readonly databaseUrl: string;
  /** Folder of the running server: raw logs, caught mail. */
  readonly dataFolder: string;
  /** What the server has printed so far. */
  output(): string;
  /** Ends the server without warning, as a power cut would. */
  kill(): Promise<void>;
  /** Starts the server again on the same database and port. */
  start(): Promise<void>;
  /** Stops the server and drops its database and folder. */
  stop(): Promise<void>;
}

/**
 * Boots the real server with the built client on free ports and a database of its own.
 * @param options `demo: true` seeds the demonstration site, which takes up to a minute.
 */
export async function bootApplication(options: { demo?: boolean } = {}): Promise<Application> {
  const databasePort = process.env.LOOPWRIGHT_TEST_DB_PORT;
  if (!databasePort) throw new Error("LOOPWRIGHT_TEST_DB_PORT is not set: run through Jest.");
  const database = await freshDatabase(databasePort, "browser");
  const dataFolder = mkdtempSync(path.join(os.tmpdir(), "loopwright-e2e-"));
  const [port, mailPort] = await freePorts(2);
  const address = `http://localhost:${port}`;
  let output = "";
  let server: ChildProcess | null = null;

  async function start(): Promise<void> {
    server = spawn(process.execPath, ["--import", "tsx", "server/main.ts"], {
      cwd: projectRoot,
      env: {
        ...process.env,
        NODE_ENV: "test",
        LOOPWRIGHT_MODE: "test",
        LOOPWRIGHT_DEMO: options.demo ? "on" : "off",
        LOOPWRIGHT_PORT: String(port),
        LOOPWRIGHT_MAIL_PORT: String(mailPort),
        LOOPWRIGHT_DATA_DIR: dataFolder,
        LOOPWRIGHT_DATABASE_URL: database.url,
        LOOPWRIGHT_PUBLIC_URL: address,
        LOOPWRIGHT_LOG_LEVEL: "warn",
      },
      stdio: ["ignore", "pipe", "pipe"],
    });
    server.stdout?.on("data", (chunk: Buffer) => (output += chunk.toString()));
    server.stderr?.on("data", (chunk: Buffer) => (output += chunk.toString()));
    await untilHealthy(address, server, () => output);
  }

  async function end(signal: NodeJS.Signals): Promise<void> {
    const child = server;
    server = null;
    if (!child || child.exitCode !== null || child.signalCode !== null) return;
    const gone = new Promise((resolve) => child.once("exit", resolve));
    child.kill(signal);
    await gone;
  }

  const application: Application = {
    address,
    databaseUrl: database.url,
    dataFolder,
    output: () => output,
    kill: () => end("SIGKILL"),
    start,
    async stop() {
      await end("SIGTERM");
      await database.drop();
      await rm(dataFolder, { recursive: true, force: true });
    },
  };
  try {
    await start();
  } catch (error) {
    await application.stop();
    throw error;
  }
  return application;
}

async function untilHealthy(address: string, server: ChildProcess, output: () => string) {
  const deadline = Date.now() + 120_000;
  while (Date.now() < deadline) {
    if (server.exitCode !== null || server.signalCode !== null) {
      throw new Error(`The server ended before it answered:\n${output()}`);
    }
    if (await isHealthy(address)) return;
    await sleep(100);
  }
  throw new Error(`The server did not answer within two minutes:\n${output()}`);
}

async function isHealthy(address: string): Promise<boolean> {
  try {
    return (await fetch(`${address}/api/v1/health`)).ok;
  } catch (error) {
    // Nothing listens yet. By name: Jest's world has a TypeError of its own.
    if (error !== null && typeof error === "object" && "name" in error) {
      if (error.name === "TypeError") return false;
    }
    throw error;
  }
}

/** Ports nothing listens on; held all at once, so that they differ. */
async function freePorts(count: number): Promise<number[]> {
  const probes = await Promise.all(
    Array.from(
      { length: count },
      () =>
        new Promise<net.Server>((resolve, reject) => {
          const probe = net.createServer();
          probe.once("error", reject);
          probe.listen(0, "127.0.0.1", () => resolve(probe));
        }),
    ),
  );
  const ports = probes.map((probe) => (probe.address() as net.AddressInfo).port);
  await Promise.all(probes.map((probe) => new Promise((resolve) => probe.close(resolve))));
  return ports;
}
