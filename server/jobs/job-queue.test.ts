import { spawnSync } from "node:child_process";
import os from "node:os";
import { pino } from "pino";
import { inTransaction } from "@server/database/transaction";
import { Job } from "@server/models/job";
import { LogImport } from "@server/models/log-import";
import { organisation } from "@server/testing/factories";
import { recognisedImport } from "@server/testing/import-factories";
import { pointToMeter } from "@server/testing/place-factories";
import { testApp } from "@server/testing/test-app";
import type { JobOutcome } from "./job-outcome";
import { newOwner } from "./job-owner";
import {
  cancelJobs,
  claimJob,
  enqueueJob,
  enqueueRecalculation,
  finishJob,
  releaseDeadOwners,
  renewLeases,
} from "./job-queue";
import { JobRunner } from "./job-runner";
import type { JobThreads } from "./job-threads";

const app = testApp();

beforeEach(() => Job.destroy({ where: {} }));

async function somewhere(organisationId?: string) {
  const id = organisationId ?? (await organisation(app)).id;
  const { point } = await pointToMeter(app, id);
  const { row } = await recognisedImport(app, { organisationId: id, pointId: point.id });
  return { organisationId: id, pointId: point.id, importId: row.id };
}

type Place = Awaited<ReturnType<typeof somewhere>>;

function queue(place: Place, kind: "check" | "import" = "check"): Promise<void> {
  return inTransaction(app.database, (transaction) =>
    enqueueJob(app.database, transaction, { ...place, kind, revision: 1 }),
  );
}

const claim = (owner = "a") => claimJob(app.database, owner, app.clock.date());

function finish(id: string, owner: string): Promise<boolean> {
  return inTransaction(app.database, (transaction) =>
    finishJob(app.database, transaction, id, owner),
  );
}

const expire = () =>
  app.database.query("UPDATE job SET lease_until = UTC_TIMESTAMP(3) - INTERVAL 1 SECOND");

test("two servers never hold one job, and both find work", async () => {
  const place = await somewhere();
  for (let i = 0; i < 6; i++) await queue(place);
  const claims = await Promise.all(["a", "b", "c", "a", "b", "c"].map((owner) => claim(owner)));
  const ids = claims.flatMap((job) => job?.id ?? []);
  expect(new Set(ids).size).toBe(ids.length);
  expect(ids.length).toBeGreaterThanOrEqual(1);
});

test("an organisation with fifty imports waiting does not keep another's one waiting", async () => {
  const many = await somewhere();
  const one = await somewhere();
  for (let i = 0; i < 50; i++) await queue(many, i % 2 === 0 ? "import" : "check");
  await queue(one, "import");
  const order = [await claim(), await claim(), await claim()];
  expect(order.map((job) => job?.organisationId)).toEqual([
    many.organisationId,
    one.organisationId,
    many.organisationId,
  ]);
});

test("with one worker, organisations with imports waiting take turns", async () => {
  const many = await somewhere();
  const few = await somewhere();
  for (let i = 0; i < 50; i++) await queue(many, "import");
  for (let i = 0; i < 2; i++) await queue(few, "import");
  const order: (string | undefined)[] = [];
  for (let i = 0; i < 5; i++) {
    const job = await claim();
    order.push(job?.organisationId);
    expect(await finish(String(job?.id), "a")).toBe(true);
  }
  const [a, b] = [many.organisationId, few.organisationId];
  expect(order).toEqual([a, b, a, b, a]);
});

test("two jobs that store never work on one point at a time", async () => {
  const place = await somewhere();
  await queue(place, "import");
  await queue(place, "import");
  expect(await claim()).not.toBeNull();
  expect(await claim()).toBeNull();
});

test("a job whose lease ran out is taken over, and its first holder can no longer end it", async () => {
  await queue(await somewhere());
  const first = await claim("dead");
  expect(await claim("next")).toBeNull();
  await expire();
  const second = await claim("next");
  expect(second).toMatchObject({ id: first?.id, interruptions: 1, failures: 0 });
  expect(await renewLeases(app.database, "dead", [String(first?.id)])).toEqual([first?.id]);
  expect(await finish(String(first?.id), "dead")).toBe(false);
  expect(await finish(String(first?.id), "next")).toBe(true);
});

test("jobs of a process of this host that is dead are free at once, a living one's are not", async () => {
  await queue(await somewhere());
  const living = newOwner();
  await claim(living);
  expect(await releaseDeadOwners(app.database)).toBe(0);
  const { pid } = spawnSync("true");
  await Job.update({ leaseOwner: `${os.hostname()}:${pid}:1:x` }, { where: {} });
  expect(await releaseDeadOwners(app.database)).toBe(1);
  expect(await claim("next")).not.toBeNull();
});

test("a cancelled job cannot be ended by the worker that still runs it", async () => {
  const place = await somewhere();
  await queue(place);
  const job = await claim();
  await inTransaction(app.database, (transaction) =>
    cancelJobs(app.database, transaction, { importId: place.importId }),
  );
  expect(await finish(String(job?.id), "a")).toBe(false);
});

test("changes in quick succession wait as one recalculation, one that runs does not stand for it", async () => {
  const place = await somewhere();
  const recalculate = () =>
    inTransaction(app.database, (transaction) =>
      enqueueRecalculation(app.database, transaction, place),
    );
  await recalculate();
  await recalculate();
  expect(await Job.count()).toBe(1);
  await claim();
  await recalculate();
  expect(await Job.count()).toBe(2);
});

/** Threads that end every job in the same way, for what the runner makes of it. */
function threadsEndingIn(outcome: JobOutcome): JobThreads {
  return {
    size: 1,
    start: () => ({ outcome: Promise.resolve(outcome), stop: () => undefined }),
    close: async () => undefined,
  };
}

async function runUntil(threads: JobThreads, done: () => Promise<boolean>): Promise<void> {
  const log = pino({ level: "silent" });
  const runner = new JobRunner(app.database, threads, app.clock, log);
  runner.start();
  try {
    for (let i = 0; i < 200 && !(await done()); i++)
      await new Promise((resolve) => setTimeout(resolve, 50));
  } finally {
    await runner.stop();
  }
}

test("a job that ends in an error three times fails, and its import says what to do", async () => {
  const place = await somewhere();
  await queue(place);
  const failing = threadsEndingIn({ kind: "error", message: "broken", stack: null });
  await runUntil(failing, async () => (await Job.findOne())?.state === "failed");
  expect(await Job.findOne()).toMatchObject({ state: "failed", failures: 2 });
  const row = await LogImport.findOne({ where: { id: place.importId } });
  expect(row?.state).toBe("failed");
  expect(row?.failure).toMatchObject({
    code: "job-error",
    remedy: expect.stringContaining("again"),
  });
});

test("a job handed back by a server that stops waits for the next one without a black mark", async () => {
  await queue(await somewhere());
  const ending = threadsEndingIn({ kind: "handedBack" });
  let seen = 0;
  await runUntil(ending, async () => ++seen > 4);
  expect(await Job.findOne()).toMatchObject({ state: "queued", failures: 0, leaseOwner: null });
});
