import { spawn } from "node:child_process";
import { createHash } from "node:crypto";
import { closeSync, existsSync, mkdirSync, openSync, readFileSync, readdirSync } from "node:fs";
import { rename, rm } from "node:fs/promises";
import net from "node:net";
import os from "node:os";
import path from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { findProcesses, run, startTicks, stopProcess } from "./processes.mjs";
import { findProgram } from "./programs.mjs";
import { SentenceError } from "./sentence-error.mjs";

const isRoot = process.getuid?.() === 0;
// mariadbd refuses to run as root unless told so, and only root may name a user.
const asUser = isRoot ? ["--user=root"] : [];

/** Where one database keeps its files, socket, process id and log. Everything is below `folder`. */
export function databasePlaces(folder) {
  const home = path.resolve(folder);
  let socket = path.join(home, "m.sock");
  // A unix socket's path may hold 107 characters; a deep checkout gets a short one elsewhere.
  if (Buffer.byteLength(socket) > 100) {
    const name = createHash("sha256").update(home).digest("hex").slice(0, 12);
    socket = path.join(os.tmpdir(), `loopwright-${name}`, "m.sock");
  }
  return {
    home,
    data: path.join(home, "data"),
    socket,
    pidFile: path.join(home, "m.pid"),
    log: path.join(home, "mariadbd.log"),
  };
}

/**
 * Creates the data folder unless it exists. The work happens beside it and is renamed into place,
 * so an interrupted set-up can never be taken for a database.
 */
export async function initialiseDatabase(places) {
  mkdirSync(places.home, { recursive: true, mode: 0o700 });
  mkdirSync(path.dirname(places.socket), { recursive: true, mode: 0o700 });
  for (const name of readdirSync(places.home).filter((entry) => entry.startsWith("data.new-"))) {
    await rm(path.join(places.home, name), { recursive: true, force: true });
  }
  if (existsSync(places.data)) return;
  const unfinished = path.join(places.home, `data.new-${process.pid}`);
  const { code, text } = await run(findProgram("mariadb-install-db"), [
    "--no-defaults",
    ...asUser,
    `--datadir=${unfinished}`,
    // Only the account that owns the folder may enter as the database's root, and only through the
    // socket: nothing on loopback is open without a password.
    "--auth-root-authentication-method=socket",
    `--auth-root-socket-user=${os.userInfo().username}`,
    "--skip-test-db",
  ]);
  if (code !== 0) {
    await rm(unfinished, { recursive: true, force: true });
    throw new SentenceError(`MariaDB could not set up its data folder ${places.data}:\n${text}`);
  }
  await rename(unfinished, places.data);
}

/** Ids of running mariadbd processes that serve exactly this data folder. */
export function findRunningDatabase(places) {
  return findProcesses(
    (words) =>
      /mariadbd$|mysqld$/.test(words[0] ?? "") && words.includes(`--datadir=${places.data}`),
  );
}

/**
 * Starts mariadbd on 127.0.0.1 and waits until it answers.
 * @param {object} options `durable: false` gives up safety against power loss for throw-away data;
 * `onSpawn` is given the result before the wait, so that nobody can lose sight of the process.
 * @returns {Promise<{pid: number, stop: () => Promise<void>}>}
 */
export async function bootDatabase(places, port, { durable = true, onSpawn } = {}) {
  const log = openSync(places.log, "a", 0o600);
  const child = spawn(
    findProgram("mariadbd", "mysqld"),
    [
      "--no-defaults",
      ...asUser,
      `--datadir=${places.data}`,
      `--socket=${places.socket}`,
      `--pid-file=${places.pidFile}`,
      `--port=${port}`,
      "--bind-address=127.0.0.1",
      "--skip-log-bin",
      "--skip-name-resolve",
      "--innodb-buffer-pool-size=256M",
      "--character-set-server=utf8mb4",
      "--collation-server=utf8mb4_unicode_ci",
      "--default-time-zone=+00:00",
      "--local-infile=0",
      "--max-allowed-packet=128M",
      ...(durable ? [] : ["--innodb-flush-log-at-trx-commit=0", "--skip-innodb-doublewrite"]),
    ],
    // Its own session: Ctrl-C must reach the server first, and the database only through us.
    { detached: true, stdio: ["ignore", log, log] },
  );
  closeSync(log);
  let startError = null;
  child.on("error", (error) => (startError = error));
  child.unref();
  const ticks = child.pid === undefined ? null : startTicks(child.pid);
  const database = {
    pid: child.pid,
    stop: () => stopProcess(child.pid, { ticks, patienceMs: 60_000 }),
  };
  if (child.pid !== undefined) onSpawn?.(database);
  const ended = () => startError !== null || child.exitCode !== null || child.signalCode !== null;
  const deadline = Date.now() + 60_000;
  while (!(await answers(places.socket))) {
    if (ended() || Date.now() > deadline) {
      if (child.pid !== undefined) await stopProcess(child.pid);
      const lastLines = readFileSync(places.log, "utf8").trimEnd().split("\n").slice(-8).join("\n");
      throw new SentenceError(
        `MariaDB did not start on port ${port}; its log ${places.log} ends with:\n${lastLines}`,
      );
    }
    await sleep(50);
  }
  return database;
}

/** Runs SQL as the database's root through its socket; an error carries MariaDB's own message. */
export async function runSql(places, sql) {
  const { code, text } = await run(
    findProgram("mariadb", "mysql"),
    ["--no-defaults", `--socket=${places.socket}`, `--user=${os.userInfo().username}`],
    { input: sql },
  );
  if (code !== 0) throw new Error(`MariaDB refused the set-up statements: ${text}`);
}

/** Whether a MariaDB greets on this socket: it speaks first, so one byte is proof. */
function answers(socket) {
  return new Promise((resolve) => {
    const connection = net.connect(socket);
    const settle = (result) => {
      connection.destroy();
      resolve(result);
    };
    connection.once("data", () => settle(true));
    connection.once("error", () => settle(false));
    connection.once("close", () => settle(false));
    connection.setTimeout(2000, () => settle(false));
  });
}
