import { mkdtempSync, rmSync, statSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { ConfigError, loadConfig, type Environment } from "./config";

const folder = mkdtempSync(path.join(os.tmpdir(), "loopwright-config-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const enough = {
  LOOPWRIGHT_DATABASE_URL: "mariadb://loopwright:pw@127.0.0.1:33070/loopwright",
  LOOPWRIGHT_DATA_DIR: folder,
};
const production = {
  ...enough,
  LOOPWRIGHT_MODE: "production",
  LOOPWRIGHT_SESSION_SECRET: "x".repeat(32),
  LOOPWRIGHT_SMTP_URL: "smtp://mail.example:25",
  LOOPWRIGHT_PUBLIC_URL: "https://energy.example/",
};

function sentencesOf(env: Environment): readonly string[] {
  try {
    loadConfig(env);
  } catch (error) {
    if (error instanceof ConfigError) return error.sentences;
    throw error;
  }
  return [];
}

it("needs nothing but a database to start on a laptop, and turns the demo on there", () => {
  expect(loadConfig(enough)).toMatchObject({
    mode: "development",
    port: 4070,
    demo: true,
    mailFakePort: 4071,
    smtpUrl: "smtp://127.0.0.1:4071",
    publicUrl: "http://localhost:4070",
    passwordCost: 12,
  });
});

it("names every wrong variable in a sentence of its own", () => {
  const sentences = sentencesOf({ LOOPWRIGHT_PORT: "70000", LOOPWRIGHT_MODE: "live" });
  expect(sentences).toHaveLength(3);
  expect(sentences.join()).toMatch(/LOOPWRIGHT_PORT must be a port number from 1 to 65535\./);
  expect(sentences.join()).toMatch(/LOOPWRIGHT_MODE must be development, production or test\./);
  expect(sentences.join()).toMatch(/LOOPWRIGHT_DATABASE_URL must be set/);
});

it("insists in production on a secret, a mail server and an address, and on no demo", () => {
  expect(sentencesOf(production)).toEqual([]);
  expect(loadConfig(production)).toMatchObject({ demo: false, mailFakePort: null });
  expect(sentencesOf({ ...enough, LOOPWRIGHT_MODE: "production" })).toHaveLength(3);
  expect(sentencesOf({ ...production, LOOPWRIGHT_SESSION_SECRET: "short" })[0]).toMatch(
    /at least 32 characters/,
  );
  expect(sentencesOf({ ...production, LOOPWRIGHT_DEMO: "on" })[0]).toMatch(/LOOPWRIGHT_DEMO/);
});

it("keeps the session secret of a laptop over restarts, readable by its owner only", () => {
  const first = loadConfig(enough).sessionSecret;
  expect(loadConfig(enough).sessionSecret).toBe(first);
  expect(first.length).toBeGreaterThanOrEqual(32);
  expect(statSync(path.join(folder, "session-secret")).mode & 0o777).toBe(0o600);
});
