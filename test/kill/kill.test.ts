import { createHash } from "node:crypto";
import { setTimeout as sleep } from "node:timers/promises";
import { QueryTypes } from "sequelize";
import type { ImportDetail } from "@shared/contracts/imports";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { connectDatabase, type Database } from "@server/database/connect";
import { selectMany } from "@server/database/bulk";
import { apiAs, type Api } from "@test/e2e/harness/api";
import { bootApplication, type Application } from "@test/e2e/harness/application";
import { foundOrganisation } from "@test/e2e/harness/people";
import { Random } from "@test/generators/random";
import { startKillableDatabase, type KillableDatabase } from "./start-killable-database";

/*
 * Kills the server, and then the database, at moments spread over an import by a seeded generator,
 * and compares what is stored afterwards with an undisturbed run, to the last bit.
 */
const serverKills = 20;
const databaseKills = 5;
const rows = 100_000;
const random = new Random(20_251_130);

// Some five minutes alone; beside other tests on two cores it may take three times that.
jest.setTimeout(1_500_000);

let database: KillableDatabase;
let application: Application;
let tables: Database;
let api: Api;
let loopId: string;

beforeAll(async () => {
  database = await startKillableDatabase();
  process.env.LOOPWRIGHT_TEST_DB_PORT = String(database.port);
  application = await bootApplication();
  await foundOrganisation(application);
  api = await apiAs(application, "engineer");
  tables = connectDatabase(application.databaseUrl, { poolSize: 2 });
  const place = { name: "Kiln Lane", zone: "Europe/London", currency: "GBP" };
  const site = await api.post<Site>("/sites", place);
  const loop = { tag: "CHW-1", name: "Chilled water", service: "chilled", gaugePressureMPa: 0.4 };
  loopId = (await api.post<Loop>(`/sites/${site.id}/loops`, loop)).id;
}, 120_000);

afterAll(async () => {
  await tables?.close();
  await application?.stop();
  await database?.stop();
}, 60_000);

/** Ten weeks of minutes over a clock change, with repeats, sentinels and a stretch out of order. */
function logFile(): string {
  const noise = new Random(7);
  const line = (i: number): string => {
    const at = new Date(Date.UTC(2025, 8, 1) + i * 60_000).toISOString();
    const flow = (28 + 8 * Math.sin(i / 230) + noise.next()).toFixed(2);
    const supply = (6 + noise.next() / 4).toFixed(2);
    const back = i % 997 === 0 ? "-9999" : (12 + Math.sin(i / 230) + noise.next() / 4).toFixed(2);
    return `${at},${flow},${supply},${back}`;
  };
  const lines = Array.from({ length: rows }, (_, i) => line(i));
  const moved = lines.splice(30_000, 500);
  return ["time,flow m3/h,supply °C,return °C", ...lines, ...moved, ...lines.slice(5, 9), ""].join(
    "\n",
  );
}

const content = new TextEncoder().encode(logFile());
let pointCount = 0;

async function until<Result>(
  what: string,
  look: () => Promise<Result | null>,
  everyMs = 50,
): Promise<Result> {
  const deadline = Date.now() + 120_000;
  for (;;) {
    const found = await look();
    if (found !== null) return found;
    if (Date.now() > deadline)
      throw new Error(`waited in vain until ${what}\n${application.output()}`);
    await sleep(everyMs);
  }
}

interface Run {
  readonly importId: string;
  readonly pointId: string;
}

/** An import that is checked and only waits to be confirmed, on a point of its own. */
async function readyImport(): Promise<Run> {
  pointCount += 1;
  const { id: pointId } = await api.post<Point>(`/loops/${loopId}/points`, {
    code: `P-${pointCount}`,
    name: `Point ${pointCount}`,
    role: "riser",
    meterSide: "return",
  });
  const { id: importId } = await api.post<ImportDetail>(`/points/${pointId}/imports`);
  await api.upload(`/imports/${importId}/files`, [{ name: "log.csv", bytes: content }]);
  await untilState(importId, "ready");
  return { importId, pointId };
}

function untilState(importId: string, state: ImportDetail["state"]): Promise<true> {
  return until(`import ${importId} is ${state}`, async () => {
    const [row] = await tables
      .query<{
        state: string;
        failure: string;
      }>("SELECT state, failure FROM log_import WHERE id = :importId", {
        replacements: { importId },
        type: QueryTypes.SELECT,
      })
      .catch(() => []);
    if (row?.state === "failed") throw new Error(`import failed: ${row.failure}`);
    return row?.state === state ? true : null;
  });
}

interface JobRow {
  readonly state: string;
  readonly owner: string | null;
  readonly stage: string | null;
}

async function jobOf({ importId }: Run): Promise<JobRow | null> {
  const [job] = await tables.query<JobRow>(
    `SELECT state, lease_owner AS owner, JSON_VALUE(progress, '$.stage') AS stage
       FROM job WHERE import_id = :importId AND kind = 'import'`,
    { replacements: { importId }, type: QueryTypes.SELECT },
  );
  return job ?? null;
}

/** Waits until another owner than `before` has claimed the job, or got as far as reading. */
async function untilUnderWay(run: Run, before: string | null, reads: boolean): Promise<JobRow> {
  return until(
    "the import's job runs",
    async () => {
      const job = await jobOf(run);
      if (job === null || job.state === "done") return job;
      if (job.state !== "running" || job.owner === before) return null;
      return reads && job.stage === "waiting" ? null : job;
    },
    5,
  );
}

/** How long an import takes from its claim, and from its first sign of progress. */
async function timed(run: Run): Promise<{ wholeMs: number; workMs: number }> {
  await api.post(`/imports/${run.importId}/confirm`);
  await untilUnderWay(run, null, false);
  const claimedAt = Date.now();
  await untilUnderWay(run, null, true);
  const startedAt = Date.now();
  await untilState(run.importId, "imported");
  return { wholeMs: Date.now() - claimedAt, workMs: Date.now() - startedAt };
}

/** Every stored figure of a point, as one hash per table, and its totals to read in a failure. */
async function stored({ pointId }: Run) {
  const hash = async (sql: string) => {
    const found = await selectMany(tables, sql, [pointId]);
    return `${found.length} rows ${createHash("sha256").update(JSON.stringify(found)).digest("hex")}`;
  };
  const columns = async (table: string) => {
    const names = await tables.query<{ name: string }>(
      `SELECT column_name AS name FROM information_schema.columns
        WHERE table_schema = DATABASE() AND table_name = :table
          AND column_name NOT IN ('point_id', 'log_file_id') ORDER BY ordinal_position`,
      { replacements: { table }, type: QueryTypes.SELECT },
    );
    return names.map(({ name }) => name).join(", ");
  };
  const table = async (name: string) =>
    hash(`SELECT ${await columns(name)} FROM ${name} WHERE point_id = ? ORDER BY 1, 2`);
  const [totals] = await tables.query<Record<string, unknown>>(
    `SELECT SUM(cooling_kwh) AS coolingKwh, SUM(covered_s) AS coveredS, SUM(volume_m3) AS volumeM3
       FROM day_energy WHERE point_id = :pointId`,
    { replacements: { pointId }, type: QueryTypes.SELECT },
  );
  return {
    totals,
    blocks: await table("reading_block"),
    intervals: await table("interval_energy"),
    days: await table("day_energy"),
  };
}

test(`${serverKills} kills of the server and ${databaseKills} of the database leave exactly what an undisturbed import leaves`, async () => {
  const calm = await readyImport();
  const ready = [await readyImport(), await readyImport(), await readyImport()];
  // The first import after a start also starts its worker, as every one after a kill does.
  await application.kill();
  await application.start();
  const { wholeMs, workMs } = await timed(calm);
  const expected = await stored(calm);
  expect(expected.intervals).toMatch(/^66\d\d rows/);

  const runs: Run[] = [];
  let current: Run | null = null;
  let owner: string | null = null;
  const next = async (): Promise<Run> => {
    const run = ready.pop() ?? (await readyImport());
    runs.push(run);
    // The same server may claim this one too: only after a kill must the owner be another.
    owner = null;
    await api.post(`/imports/${run.importId}/confirm`);
    return run;
  };
  /** Sleeps into the import; false where it ended before. Every fourth time its start counts too. */
  const wakeInside = async (run: Run, kill: number): Promise<boolean> => {
    const reads = kill % 4 !== 0;
    // Only a server that just started spends time before its worker reads.
    const startsWorker = owner !== null && !reads;
    const job = await untilUnderWay(run, owner, reads);
    if (job.state === "done") return false;
    owner = job.owner;
    await sleep(random.next() * (startsWorker ? wholeMs : workMs));
    return (await jobOf(run))?.state === "running";
  };

  for (let kills = 0; kills < serverKills;) {
    current ??= await next();
    if (await wakeInside(current, kills)) {
      await application.kill();
      kills += 1;
      await application.start();
    } else current = null;
  }
  for (const run of runs.splice(0)) {
    await untilState(run.importId, "imported");
    expect(await stored(run)).toEqual(expected);
  }

  for (let kills = 0; kills < databaseKills;) {
    const run = await next();
    if (await wakeInside(run, 1)) {
      await database.kill();
      kills += 1;
      await database.boot();
    }
    await untilState(run.importId, "imported");
    expect(await stored(run)).toEqual(expected);
  }
});
