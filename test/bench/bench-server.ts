import { spawn, type ChildProcess } from "node:child_process";
import { randomBytes } from "node:crypto";
import { readFileSync, writeFileSync } from "node:fs";
import net from "node:net";
import path from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { hash } from "bcryptjs";
import { connectDatabase } from "@server/database/connect";
import { Account } from "@server/models/account";
import { Membership } from "@server/models/membership";
import { Organisation } from "@server/models/organisation";

/** The server as people run it, in production mode, on a database of its own. */
export interface BenchServer {
  readonly databaseName: string;
  readonly databaseUrl: string;
  /** The API as somebody signed in; paths start after /api/v1. Throws on an error answer. */
  get<T>(path: string): Promise<T>;
  send<T>(method: "POST" | "PUT" | "PATCH", path: string, body?: object): Promise<T>;
  upload<T>(path: string, name: string, bytes: Buffer): Promise<T>;
  /** Where and with what somebody signed in asks for a path of the API, for calls made elsewhere. */
  request(path: string): { readonly url: string; readonly headers: Record<string, string> };
  /** Greatest memory the process has held since it started or was asked to forget it, MB. */
  peakMb(): number;
  forgetPeak(): void;
  /** What it holds now, MB. */
  residentMb(): number;
  stop(): Promise<void>;
}

const password = "warm return, cold supply";
const email = "engineer@bench.example";

export async function startBenchServer(
  databasePort: string,
  workFolder: string,
): Promise<BenchServer> {
  const root = `mariadb://root@127.0.0.1:${databasePort}/`;
  const databaseName = `bench_${randomBytes(4).toString("hex")}`;
  const databaseUrl = `${root}${databaseName}`;
  await administer(`${root}mysql`, `CREATE DATABASE ${databaseName} CHARACTER SET utf8mb4`);
  const port = await freePort();
  const address = `http://127.0.0.1:${port}`;
  const child = spawn(process.execPath, ["--import", "tsx", "server/main.ts"], {
    env: {
      ...process.env,
      NODE_ENV: "production",
      LOOPWRIGHT_MODE: "production",
      LOOPWRIGHT_PORT: String(port),
      LOOPWRIGHT_DATA_DIR: path.join(workFolder, databaseName),
      LOOPWRIGHT_DATABASE_URL: databaseUrl,
      LOOPWRIGHT_PUBLIC_URL: address,
      LOOPWRIGHT_SESSION_SECRET: randomBytes(32).toString("hex"),
      LOOPWRIGHT_SMTP_URL: "smtp://127.0.0.1:9",
      LOOPWRIGHT_LOG_LEVEL: "error",
    },
    stdio: ["ignore", "ignore", "inherit"],
  });
  await untilHealthy(address, child);
  await foundEngineer(databaseUrl);
  const cookie = await signIn(address);

  const request = (path: string) => ({
    url: `${address}/api/v1${path}`,
    headers: { cookie, "X-Loopwright-Request": "1" },
  });

  async function call<T>(method: string, path: string, init: RequestInit = {}): Promise<T> {
    const { url, headers } = request(path);
    const answer = await fetch(url, { ...init, method, headers: { ...init.headers, ...headers } });
    const text = await answer.text();
    if (!answer.ok) throw new Error(`${method} ${url}: ${answer.status} ${text}`);
    return JSON.parse(text) as T;
  }

  const memory = (field: "VmHWM" | "VmRSS") => {
    const status = readFileSync(`/proc/${child.pid}/status`, "utf8");
    return Number(new RegExp(`${field}:\\s+(\\d+) kB`).exec(status)?.[1]) / 1024;
  };

  return {
    databaseName,
    databaseUrl,
    request,
    get: (url) => call("GET", url),
    send: (method, url, body) =>
      call(method, url, {
        headers: { "content-type": "application/json" },
        body: JSON.stringify(body ?? {}),
      }),
    upload(url, name, bytes) {
      const form = new FormData();
      form.append("file", new Blob([new Uint8Array(bytes)]), name);
      return call("POST", url, { body: form });
    },
    peakMb: () => memory("VmHWM"),
    forgetPeak: () => writeFileSync(`/proc/${child.pid}/clear_refs`, "5"),
    residentMb: () => memory("VmRSS"),
    async stop() {
      const gone = new Promise((resolve) => child.once("exit", resolve));
      child.kill("SIGTERM");
      await gone;
      await administer(`${root}mysql`, `DROP DATABASE ${databaseName}`);
    },
  };
}

async function signIn(address: string): Promise<string> {
  const answer = await fetch(`${address}/api/v1/session`, {
    method: "POST",
    headers: { "content-type": "application/json" },
    body: JSON.stringify({ email, password }),
  });
  if (!answer.ok) throw new Error(`sign-in: ${await answer.text()}`);
  return answer.headers
    .getSetCookie()
    .map((line) => line.split(";")[0])
    .join("; ");
}

async function foundEngineer(databaseUrl: string): Promise<void> {
  const database = connectDatabase(databaseUrl, { poolSize: 1 });
  try {
    const createdAt = new Date();
    const { id: organisationId } = await Organisation.create({ name: "Bench works", createdAt });
    const passwordHash = await hash(password, 4);
    const { id: accountId } = await Account.create({
      email,
      name: "Bench engineer",
      passwordHash,
      createdAt,
    });
    await Membership.create({
      organisationId,
      accountId,
      role: "engineer",
      state: "active",
      createdAt,
    });
  } finally {
    await database.close();
  }
}

async function untilHealthy(address: string, child: ChildProcess): Promise<void> {
  for (const deadline = Date.now() + 60_000; Date.now() < deadline; await sleep(100)) {
    if (child.exitCode !== null) throw new Error("the server ended before it answered");
    try {
      if ((await fetch(`${address}/api/v1/health`)).ok) return;
    } catch (error) {
      if (!(error instanceof TypeError)) throw error;
    }
  }
  throw new Error("the server did not answer within a minute");
}

async function administer(url: string, sql: string): Promise<void> {
  const database = connectDatabase(url, { poolSize: 1 });
  try {
    await database.query(sql);
  } finally {
    await database.close();
  }
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.once("error", reject);
    probe.listen(0, "127.0.0.1", () => {
      const found = probe.address();
      probe.close(() =>
        typeof found === "object" && found !== null
          ? resolve(found.port)
          : reject(new Error("no free port")),
      );
    });
  });
}
