import { rmSync } from "node:fs";
import path from "node:path";
import type { ImportDetail } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { QueryTypes } from "sequelize";
import { AuditEvent } from "@server/models/audit-event";
import type { JobOutcome } from "@server/jobs/job-outcome";
import { claimJob } from "@server/jobs/job-queue";
import { runJob } from "@server/jobs/run-job";
import { loadDays } from "@server/readings/day-rows";
import { lockPoint } from "@server/readings/recalculate-energy";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();

const parts = { year: "2025", month: "07" };
/** Rows of a steady logger: 28.8 m³/h, 6.90 → 12.80 °C, five minutes apart, ISO times in UTC. */
function steadyLog(count: number, fromHour = 6, flow = "28.80"): string {
  const rows = Array.from({ length: count }, (_, i) => {
    const at = new Date(Date.UTC(2025, 6, 14, fromHour) + i * 300_000).toISOString();
    return `${at},${flow},6.90,12.80`;
  });
  return ["time,flow m3/h,supply °C,return °C", ...rows, ""].join("\n");
}

async function open(agent: Agent, pointId: string): Promise<ImportDetail> {
  return (await agent.post(`/points/${pointId}/imports`).expect(201)).body as ImportDetail;
}

async function upload(agent: Agent, importId: string, text: string | Buffer, name = "log.csv") {
  const answer = await agent
    .post(`/imports/${importId}/files`)
    .attach("file", Buffer.isBuffer(text) ? text : Buffer.from(text), name)
    .expect(201);
  await runJobs(app);
  return answer.body as ImportDetail;
}

async function read(agent: Agent, importId: string): Promise<ImportDetail> {
  return (await agent.get(`/imports/${importId}`).expect(200)).body as ImportDetail;
}

async function started(text: string | Buffer, role: "surveyor" | "engineer" = "surveyor") {
  const agent = await signedIn(app, { role });
  const { point, site } = await pointToMeter(app, agent.organisationId);
  const { id } = await open(agent, point.id);
  await upload(agent, id, text);
  return { agent, point, site, id };
}

async function imported(agent: Agent, pointId: string, text: string): Promise<ImportDetail> {
  const { id } = await open(agent, pointId);
  await upload(agent, id, text);
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  return read(agent, id);
}

async function blockCount(pointId: string): Promise<number> {
  const [row] = await app.database.query<{ n: string }>(
    "SELECT COUNT(*) AS n FROM reading_block WHERE point_id = :pointId",
    { replacements: { pointId }, type: QueryTypes.SELECT },
  );
  return Number(row?.n);
}

async function coolingKwh(pointId: string): Promise<number> {
  const days = await loadDays(app.database, pointId, "2025-01-01", "2026-01-01");
  return days.reduce((sum, day) => sum + day.totals.cooling.energyKwh, 0);
}

test("a plain file goes from upload to energy, and its bytes come back unchanged", async () => {
  const text = steadyLog(25);
  const { agent, point, id } = await started(text);
  const ready = await read(agent, id);
  expect(ready.state).toBe("ready");
  expect(ready.files[0]?.questions).toEqual([]);
  // 28.8 m³/h, 6.90 → 12.80 °C, meter on the return: 197.798 kW, the trade's worked interval.
  expect(ready.checks?.energy?.coolingKwh).toBeCloseTo(2 * 197.798, 2);
  expect(ready.checks?.rows).toMatchObject({ measured: 25, expected: 25, missing: 0 });
  expect(await blockCount(point.id)).toBe(0);

  const confirmed = await agent.post(`/imports/${id}/confirm`).expect(202);
  expect(confirmed.body).toMatchObject({ state: "importing", progress: { stage: "waiting" } });
  await runJobs(app);
  expect(await read(agent, id)).toMatchObject({ state: "imported", rowsStored: 25 });
  expect(await coolingKwh(point.id)).toBeCloseTo(2 * 197.798, 2);

  const fileId = ready.files[0]?.id;
  const raw = await agent.get(`/imports/${id}/files/${fileId}/raw`).buffer(true).expect(200);
  expect(raw.body.toString()).toBe(text);
  const rows = await agent.get(`/imports/${id}/files/${fileId}/rows?line=3&limit=1`).expect(200);
  expect(rows.body.rows).toEqual([
    { line: 3, cells: ["2025-07-14T06:05:00.000Z", "28.80", "6.90", "12.80"] },
  ]);
  const kinds = (await AuditEvent.findAll({ where: { subjectKind: "import", subjectId: id } })).map(
    (event) => event.kind,
  );
  expect(kinds).toEqual(["import-opened", "log-file-added", "import-confirmed"]);
});

test("a file whose dates fit two orders asks, and nothing is stored until it is answered", async () => {
  const rows = ["03/04/2025 08:00,28.80,6.90,12.80", "05/04/2025 08:00,28.80,6.90,12.80"];
  const { agent, point, id } = await started(
    ["time,flow m3/h,supply °C,return °C", ...rows, ""].join("\n"),
  );
  const asking = await read(agent, id);
  expect(asking.state).toBe("asking");
  const codes = asking.files[0]?.questions.map(({ code }) => code);
  expect(codes).toContain("dateOrder");
  for (const call of ["confirm", "check"]) {
    const refused = await agent.post(`/imports/${id}/${call}`).expect(409);
    expect(refused.body.remedy).toBeTruthy();
  }
  expect(await blockCount(point.id)).toBe(0);

  const [file] = asking.files;
  const recipe = file?.recipe as FileRecipe;
  const answered = {
    ...recipe,
    time: { format: { kind: "calendar", order: "dayMonthYear" }, clock: { kind: "site" } },
  };
  await agent.put(`/imports/${id}/files/${file?.id}/recipe`, answered).expect(200);
  await runJobs(app);
  const ready = await read(agent, id);
  expect(ready).toMatchObject({ state: "ready", files: [{ questions: [] }] });
  expect(ready.checks?.files[0]?.firstInstant).toBe("2025-04-03T08:00:00.000Z");
  expect(await blockCount(point.id)).toBe(0);
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  expect(await blockCount(point.id)).toBe(2);
});

test("another header line reads the file anew, with the columns that line names", async () => {
  const { agent, id } = await started(
    ["a,b,c,d", "time,flow L/s,supply °C,return °C", "2025-07-14T06:00:00Z,8.00,6.90,12.80"]
      .concat(["2025-07-14T06:05:00Z,8.00,6.90,12.80", ""])
      .join("\n"),
  );
  const [file] = (await read(agent, id)).files;
  const recipe = file?.recipe as FileRecipe;
  expect(recipe.dialect).toMatchObject({ headerLine: 2, firstDataLine: 3 });
  const path = `/imports/${id}/files/${file?.id}/recipe`;
  const other = { ...recipe, dialect: { ...recipe.dialect, headerLine: 1, firstDataLine: 2 } };
  const reading = await agent.put(path, other).expect(200);
  expect(reading.body).toMatchObject({ state: "reading", progress: { stage: "waiting" } });
  await runJobs(app);
  const [anew] = (await read(agent, id)).files;
  expect(anew?.recipe?.columns.map(({ header }) => header)).toEqual(["a", "b", "c", "d"]);
  await agent.put(path, recipe).expect(200);
  await runJobs(app);
  expect((await read(agent, id)).files[0]?.recipe).toEqual(recipe);
});

test("flow and temperatures in two files with other steps and units become one energy", async () => {
  const flow = Array.from({ length: 61 }, (_, i) => `${iso(i * 60_000)};126,80`);
  const temperatures = Array.from({ length: 13 }, (_, i) => `${iso(i * 300_000)};44,42;55,04`);
  const { agent, point, id } = await started(["time;flow gpm", ...flow, ""].join("\n"));
  await upload(
    agent,
    id,
    ["time;supply °F;return °F", ...temperatures, ""].join("\n"),
    "temperatures.csv",
  );
  const ready = await read(agent, id);
  expect(ready.state).toBe("ready");
  expect(ready.checks).toMatchObject({ rowsWithoutTemperature: 0, energyBlockedBy: null });
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  // 126.80 gpm = 28.7994 m³/h at 6.90 → 12.80 °C for an hour.
  expect(await coolingKwh(point.id)).toBeCloseTo((197.798 * 28.79941) / 28.8, 2);
});

test("the same file again is recognised by its bytes and refused until the first is undone", async () => {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  const first = await imported(agent, point.id, steadyLog(25));
  const kwh = await coolingKwh(point.id);
  const { id } = await open(agent, point.id);
  await upload(agent, id, steadyLog(25), "same again.csv");
  expect((await read(agent, id)).files[0]?.sameAs).toMatchObject({ importId: first.id });
  const refused = await agent.post(`/imports/${id}/confirm`).expect(409);
  expect(refused.body.code).toBe("same-file-imported");
  await agent.post(`/imports/${first.id}/undo`).expect(202);
  // Pressed twice it is undone once.
  await agent.post(`/imports/${first.id}/undo`).expect(202);
  await runJobs(app);
  expect(await coolingKwh(point.id)).toBe(0);
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  expect(await coolingKwh(point.id)).toBe(kwh);
});

test("a longer download of the same logger completes the first and counts no minute twice", async () => {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  const first = await imported(agent, point.id, steadyLog(13));
  const second = await imported(agent, point.id, steadyLog(25));
  expect(second.state).toBe("imported");
  const steps = second.checks?.files[0]?.steps ?? [];
  expect(steps.find(({ code }) => code === "overlapEqual")?.count).toBe(13);
  expect(await coolingKwh(point.id)).toBeCloseTo(2 * 197.798, 2);
  await agent.post(`/imports/${first.id}/undo`).expect(202);
  await runJobs(app);
  expect(await coolingKwh(point.id)).toBeCloseTo(2 * 197.798, 2);
});

test("readings that differ from stored ones wait for a choice, and the choice decides", async () => {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  await imported(agent, point.id, steadyLog(13));
  const { id } = await open(agent, point.id);
  await upload(agent, id, steadyLog(13, 6, "14.40"), "corrected.csv");
  expect(await read(agent, id)).toMatchObject({
    state: "asking",
    checks: { undecided: ["overlap"] },
  });
  await agent.post(`/imports/${id}/confirm`).expect(409);
  await agent.patch(`/imports/${id}/repairs`, { overlap: "keepEarlier" }).expect(200);
  await runJobs(app);
  expect((await read(agent, id)).checks?.energy?.coolingKwh).toBeCloseTo(197.798, 2);
  await agent.patch(`/imports/${id}/repairs`, { overlap: "useThis" }).expect(200);
  await runJobs(app);
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  expect(await coolingKwh(point.id)).toBeCloseTo(197.798 / 2, 2);
});

test("an import that was confirmed before another changed its ground is checked again", async () => {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  const late = await open(agent, point.id);
  await upload(agent, late.id, steadyLog(13, 6, "14.40"), "late.csv");
  await imported(agent, point.id, steadyLog(13));
  await agent.post(`/imports/${late.id}/confirm`).expect(202);
  await runJobs(app);
  expect(await read(agent, late.id)).toMatchObject({
    state: "asking",
    checks: { undecided: ["overlap"] },
  });
  expect(await coolingKwh(point.id)).toBeCloseTo(197.798, 2);
});

test("a surveyor undoes their own import only, an engineer anybody's", async () => {
  const engineer = await signedIn(app, { role: "engineer" });
  const { organisationId } = engineer;
  const { point } = await pointToMeter(app, organisationId);
  const { id } = await imported(engineer, point.id, steadyLog(13));
  const surveyor = await signedIn(app, { role: "surveyor", organisationId });
  expect((await read(surveyor, id)).can).toMatchObject({ undo: false, confirm: false });
  await surveyor.post(`/imports/${id}/undo`).expect(403);
  await engineer.post(`/imports/${id}/undo`).expect(202);
  await runJobs(app);
  const undone = await read(engineer, id);
  expect(undone).toMatchObject({ state: "undone", rowsStored: null, can: { reopen: true } });
  await engineer.post(`/imports/${id}/reopen`).expect(200);
  await runJobs(app);
  expect((await read(engineer, id)).state).toBe("ready");
});

test("a cancelled import stores nothing and keeps its files for another try", async () => {
  const { agent, point, id } = await started(steadyLog(13));
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await agent.post(`/imports/${id}/cancel`).expect(200);
  await runJobs(app);
  expect(await read(agent, id)).toMatchObject({ state: "cancelled", fileNames: ["log.csv"] });
  expect(await blockCount(point.id)).toBe(0);
});

test("an import can be cancelled while its job stores, without waiting for it", async () => {
  const { agent, point, id } = await started(steadyLog(13));
  await agent.post(`/imports/${id}/confirm`).expect(202);
  const job = await claimJob(app.database, "busy", app.clock.date());
  if (job === null) throw new Error("the confirmed import has no job");
  let outcome: Promise<JobOutcome> | undefined;
  // Another job of the point holds it, so that this one stands still in the midst of storing.
  await app.database.transaction(async (transaction) => {
    await lockPoint(app.database, transaction, point.id);
    const { files } = app.services;
    const around = { database: app.database, files, owner: "busy" };
    outcome = runJob(job, { ...around, wanted: () => "go on", onProgress: () => undefined });
    await agent.post(`/imports/${id}/cancel`).expect(200);
  });
  expect(await outcome).toEqual({ kind: "dropped" });
  expect((await read(agent, id)).state).toBe("cancelled");
  expect(await blockCount(point.id)).toBe(0);
});

test("an import whose file the server has lost fails with what to do, and at once", async () => {
  const { agent, id } = await started(steadyLog(13));
  await agent.post(`/imports/${id}/confirm`).expect(202);
  rmSync(path.join(app.config.dataDir, "files"), { recursive: true });
  await runJobs(app);
  const failed = await read(agent, id);
  expect(failed).toMatchObject({ state: "failed", failure: { code: "file-missing" } });
});

test("what is no text log is refused with the reason, and one that cannot be read says why", async () => {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point } = await pointToMeter(app, agent.organisationId);
  const { id } = await open(agent, point.id);
  const wrong = await agent.post(`/imports/${id}/files`).attach("file", Buffer.from("x"), "a.xls");
  expect(wrong.status).toBe(422);
  expect(wrong.body.errors[0]).toMatchObject({ pointer: "/body/file", code: "other-spreadsheet" });
  await upload(agent, id, Buffer.from([0xd0, 0xcf, 0x11, 0xe0, 0, 0, 0, 0]), "renamed.csv");
  expect(await read(agent, id)).toMatchObject({
    state: "asking",
    files: [{ unreadable: { code: "oldSpreadsheet" } }],
  });
});

test("a name in another script survives the upload's headers", async () => {
  const { agent, id } = await started(steadyLog(13));
  await upload(agent, id, steadyLog(2, 9), "Vorlauf Gebäude Ü – 冷水.csv");
  expect((await read(agent, id)).fileNames[1]).toBe("Vorlauf Gebäude Ü – 冷水.csv");
});

test("the list pages newest first and narrows to a point or a site", async () => {
  const agent = await signedIn(app, { role: "surveyor" });
  const { point, site } = await pointToMeter(app, agent.organisationId);
  const other = await pointToMeter(app, agent.organisationId);
  const ids = [];
  for (let i = 0; i < 3; i++) ids.push((await open(agent, point.id)).id);
  await open(agent, other.point.id);
  const first = await agent.get(`/imports?siteId=${site.id}&limit=2`).expect(200);
  expect(first.body.items.map((item: { id: string }) => item.id)).toEqual([ids[2], ids[1]]);
  const rest = await agent.get(`/imports?pointId=${point.id}&cursor=${first.body.nextCursor}`);
  expect(rest.body.items.map((item: { id: string }) => item.id)).toEqual([ids[0]]);
});

function iso(offsetMs: number): string {
  return new Date(Date.parse(`${parts.year}-${parts.month}-14T06:00:00Z`) + offsetMs).toISOString();
}
