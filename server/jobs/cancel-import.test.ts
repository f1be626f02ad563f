import { QueryTypes } from "sequelize";
import type { ImportDetail } from "@shared/contracts/imports";
import { Job, type JobProgress } from "@server/models/job";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";
import type { JobOutcome } from "./job-outcome";
import { claimJob } from "./job-queue";
import { runJob } from "./run-job";

const app = testApp();

/** Minutes of a varying load, with all that recognition and the checks ask for in the file itself. */
function minutes(count: number): Buffer {
  const rows = Array.from({ length: count }, (_, i) => {
    const at = new Date(Date.UTC(2024, 0, 1) + i * 60_000).toISOString();
    const flow = (28 + 8 * Math.sin(i / 230)).toFixed(2);
    return `${at},${flow},6.${40 + (i % 7)},12.${20 + ((i * 13) % 50)}`;
  });
  return Buffer.from(["time,flow m3/h,supply °C,return °C", ...rows, ""].join("\n"));
}

async function received(content: Buffer) {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  const opened = await agent.post(`/points/${point.id}/imports`).expect(201);
  const { id } = opened.body as ImportDetail;
  await agent.post(`/imports/${id}/files`).attach("file", content, "log.csv").expect(201);
  return { agent, pointId: point.id, id };
}

const stateOf = async (agent: Agent, id: string) =>
  ((await agent.get(`/imports/${id}`).expect(200)).body as ImportDetail).state;

interface Watch {
  readonly wanted?: () => "go on" | "drop";
  readonly onProgress?: (progress: Omit<JobProgress, "secondsLeft">) => void;
}

/** Runs the next waiting job as a worker would; null where none waits. */
async function runNext({ wanted, onProgress }: Watch): Promise<JobOutcome | null> {
  const job = await claimJob(app.database, "test", app.clock.date());
  if (job === null) return null;
  return runJob(job, {
    database: app.database,
    files: app.services.files,
    owner: "test",
    wanted: wanted ?? (() => "go on"),
    onProgress: onProgress ?? (() => undefined),
  });
}

async function rowsOf(table: string, pointId: string): Promise<number> {
  const [row] = await app.database.query<{ n: string }>(
    `SELECT COUNT(*) AS n FROM ${table} WHERE point_id = :pointId`,
    { replacements: { pointId }, type: QueryTypes.SELECT },
  );
  return Number(row?.n);
}

// More than one megabyte, which is how much is read at a time.
const content = minutes(40_000);

test.each([
  ["recognising", 0],
  ["reading", 1],
  ["checking", 1],
  ["storing", 2],
  ["energy", 2],
] as const)(
  "a cancel while %s is heard at once and leaves nothing stored",
  async (stage, before) => {
    const { agent, pointId, id } = await received(content);
    for (let job = 0; job < before; job++) {
      if (job === 1) {
        await runNext({});
        expect(await stateOf(agent, id)).toBe("ready");
        await agent.post(`/imports/${id}/confirm`).expect(202);
      } else expect(await runNext({})).toEqual({ kind: "done" });
    }
    let cancelling: Promise<unknown> | undefined;
    let looksAfter = 0;
    const seen: string[] = [];
    const outcome = await runNext({
      onProgress(progress) {
        seen.push(progress.stage);
        if (progress.stage === stage)
          cancelling ??= agent.post(`/imports/${id}/cancel`).then(({ status }) => status);
      },
      wanted() {
        if (cancelling === undefined) return "go on";
        looksAfter++;
        return "drop";
      },
    });
    expect(await cancelling).toBe(200);
    expect(outcome).toEqual({ kind: "dropped" });
    expect(seen.at(-1)).toBe(stage);
    expect(looksAfter).toBe(1);
    expect(await stateOf(agent, id)).toBe("cancelled");
    expect(await rowsOf("reading_block", pointId)).toBe(0);
    expect(await rowsOf("interval_energy", pointId)).toBe(0);
    expect(await Job.count({ where: { importId: id, state: "running" } })).toBe(0);
    expect(await runNext({})).toBeNull();
  },
);

test("no part of an import works for long without a look at whether it is still wanted", async () => {
  const { agent, id } = await received(minutes(250_000));
  let longestMs = 0;
  let looks = 0;
  let last = process.cpuUsage();
  const wanted = (): "go on" => {
    const { user, system } = process.cpuUsage(last);
    longestMs = Math.max(longestMs, (user + system) / 1000);
    last = process.cpuUsage();
    looks++;
    return "go on";
  };
  const begin = () => (last = process.cpuUsage());
  begin();
  await runNext({ wanted });
  begin();
  await runNext({ wanted });
  await agent.post(`/imports/${id}/confirm`).expect(202);
  begin();
  expect(await runNext({ wanted })).toEqual({ kind: "done" });
  expect(await stateOf(agent, id)).toBe("imported");
  expect(looks).toBeGreaterThan(200);
  expect(longestMs).toBeLessThan(1000);
  await runJobs(app);
}, 120_000);
