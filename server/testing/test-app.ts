import { mkdtempSync, rmSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import type { Express } from "express";
import { pino } from "pino";
import supertest from "supertest";
import { createApp } from "@server/app";
import { loadConfig, type Config } from "@server/config";
import { connectDatabase, type Database } from "@server/database/connect";
import type { Services } from "@server/services";
import { closeServices, createServices } from "@server/create-services";
import { freshDatabase } from "./fresh-database";
import { TestClock } from "./test-clock";

/** The application of one test file, on a fresh database of its own. Usable inside hooks and tests. */
export interface TestApp {
  readonly services: Services;
  readonly database: Database;
  readonly config: Config;
  readonly clock: TestClock;
  readonly express: Express;
  /** A caller nobody has signed in; paths start at /api/v1 or wherever they like. */
  readonly anonymous: ReturnType<typeof supertest>;
}

interface Running {
  services: Services;
  clock: TestClock;
  express: Express;
  stop(): Promise<void>;
}

/**
 * Call once at the top of a test file: makes the database before its tests and drops it after.
 *
 *     const app = testApp();
 *     it("lists sites", async () => {
 *       const surveyor = await signedIn(app, { role: "surveyor" });
 *       const answer = await surveyor.get("/sites").expect(200);
 *     });
 *
 * `overrides` replaces parts of the configuration, such as `{ passwordCost: 12 }`.
 */
export function testApp(overrides: Partial<Config> = {}): TestApp {
  let running: Running | undefined;
  beforeAll(async () => {
    running = await start(overrides);
  }, 30_000);
  afterAll(async () => {
    await running?.stop();
  });
  const now = (): Running => {
    if (!running) throw new Error("The test app lives inside hooks and tests only.");
    return running;
  };
  return {
    get services() {
      return now().services;
    },
    get database() {
      return now().services.database;
    },
    get config() {
      return now().services.config;
    },
    get clock() {
      return now().clock;
    },
    get express() {
      return now().express;
    },
    get anonymous() {
      return supertest(now().express);
    },
  };
}

async function start(overrides: Partial<Config>): Promise<Running> {
  const port = process.env.LOOPWRIGHT_TEST_DB_PORT;
  if (!port) throw new Error("LOOPWRIGHT_TEST_DB_PORT is not set: run through jest's set-up.");
  const fresh = await freshDatabase(port, "test");
  const dataDir = mkdtempSync(path.join(os.tmpdir(), "loopwright-test-"));
  const config: Config = {
    ...loadConfig({
      LOOPWRIGHT_MODE: "test",
      LOOPWRIGHT_DATABASE_URL: fresh.url,
      LOOPWRIGHT_DATA_DIR: dataDir,
      LOOPWRIGHT_SESSION_SECRET: "a secret for tests that is long enough",
    }),
    ...overrides,
  };
  const clock = new TestClock();
  const log = pino({ level: config.logLevel });
  const database = connectDatabase(config.databaseUrl);
  const services = await createServices({ config, database, clock, log });
  return {
    services,
    clock,
    express: createApp(services),
    async stop() {
      await closeServices(services);
      await fresh.drop();
      rmSync(dataDir, { recursive: true, force: true });
    },
  };
}
