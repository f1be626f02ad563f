import type { ImportHistoryEvent } from "@shared/contracts/import-results";
import type { ImportDetail, ImportSummary } from "@shared/contracts/imports";
import { loadDays } from "@server/readings/day-rows";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();

/** A quarter-hour of conflicting rows in a steady log, five minutes apart. */
const twice = [
  "time,flow m3/h,supply °C,return °C",
  ...Array.from({ length: 25 }, (_, i) => {
    const at = new Date(Date.UTC(2025, 6, 14, 6) + i * 300_000).toISOString();
    const row = `${at},28.80,6.90,12.80`;
    return i === 5 ? `${row}\n${at},57.60,6.90,12.80` : row;
  }),
  "",
].join("\n");

async function read(agent: Agent, id: string): Promise<ImportDetail> {
  return (await agent.get(`/imports/${id}`).expect(200)).body as ImportDetail;
}

async function opened(agent: Agent): Promise<{ id: string; pointId: string; siteId: string }> {
  const { point, site } = await pointToMeter(app, agent.organisationId);
  const { body } = await agent.post(`/points/${point.id}/imports`).expect(201);
  return { id: (body as ImportDetail).id, pointId: point.id, siteId: site.id };
}

/** Imported with the first of conflicting rows. */
async function imported(agent: Agent) {
  const at = await opened(agent);
  await agent.post(`/imports/${at.id}/files`).attach("file", Buffer.from(twice), "log.csv");
  await runJobs(app);
  await agent.patch(`/imports/${at.id}/repairs`, { conflictingRepeats: "keepFirst" }).expect(200);
  await runJobs(app);
  await agent.post(`/imports/${at.id}/confirm`).expect(202);
  await runJobs(app);
  return at;
}

async function coolingKwh(pointId: string): Promise<number> {
  const days = await loadDays(app.database, pointId, "2025-01-01", "2026-01-01");
  return days.reduce((sum, day) => sum + day.totals.cooling.energyKwh, 0);
}

const history = async (agent: Agent, id: string) =>
  ((await agent.get(`/imports/${id}/history`).expect(200)).body as { items: ImportHistoryEvent[] })
    .items;

test("changed choices take the readings out, keep files and choices, and are imported again", async () => {
  const agent = await signedIn(app, { role: "engineer", name: "Ada" });
  const { id, pointId } = await imported(agent);
  const before = await coolingKwh(pointId);
  expect(before).toBeCloseTo(2 * 197.798, 2);

  const asked = await agent.post(`/imports/${id}/change-choices`).expect(202);
  expect(asked.body).toMatchObject({ state: "imported", can: { undo: false } });
  // Asking twice starts it once.
  await agent.post(`/imports/${id}/change-choices`).expect(202);
  await runJobs(app);
  const open = await read(agent, id);
  expect(open).toMatchObject({
    state: "ready",
    rowsStored: null,
    repair: { conflictingRepeats: "keepFirst" },
  });
  expect(open.files).toHaveLength(1);
  expect(await coolingKwh(pointId)).toBe(0);

  await agent.patch(`/imports/${id}/repairs`, { conflictingRepeats: "keepLast" }).expect(200);
  await runJobs(app);
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  expect((await read(agent, id)).state).toBe("imported");
  expect(await coolingKwh(pointId)).toBeGreaterThan(before + 10);
  expect((await history(agent, id)).map(({ kind, by }) => [kind, by])).toEqual([
    ["opened", "Ada"],
    ["confirmed", "Ada"],
    ["changed", "Ada"],
    ["confirmed", "Ada"],
  ]);
});

test("an import that is undone plainly stays undone, and its history says who", async () => {
  const agent = await signedIn(app, { role: "engineer", name: "Ben" });
  const { id } = await imported(agent);
  await agent.post(`/imports/${id}/undo`).expect(202);
  await runJobs(app);
  expect((await read(agent, id)).state).toBe("undone");
  const refused = await agent.post(`/imports/${id}/change-choices`).expect(409);
  expect(refused.body.code).toBe("import-not-stored");
  await agent.post(`/imports/${id}/reopen`).expect(200);
  await runJobs(app);
  expect((await history(agent, id)).map(({ kind }) => kind)).toEqual([
    "opened",
    "confirmed",
    "undone",
    "reopened",
  ]);
});

test("only who imported changes the choices, and an administrator", async () => {
  const owner = await signedIn(app, { role: "surveyor" });
  const { organisationId } = owner;
  const { id } = await imported(owner);
  const colleague = await signedIn(app, { role: "engineer", organisationId });
  await colleague.post(`/imports/${id}/change-choices`).expect(403);
  const administrator = await signedIn(app, { role: "administrator", organisationId });
  await administrator.post(`/imports/${id}/change-choices`).expect(202);
});

test("the list narrows to a person, a state and a point", async () => {
  const first = await signedIn(app, { role: "surveyor", name: "Cleo" });
  const { organisationId } = first;
  const second = await signedIn(app, { role: "engineer", name: "Dan", organisationId });
  const a = await opened(first);
  const b = await opened(second);
  await second.post(`/imports/${b.id}/cancel`).expect(200);
  const { items: people } = (await first.get("/import-people").expect(200)).body as {
    items: { accountId: string; name: string }[];
  };
  expect(people.map(({ name }) => name)).toEqual(["Cleo", "Dan"]);
  const ids = async (query: string) =>
    (
      (await first.get(`/imports?${query}`).expect(200)).body as { items: ImportSummary[] }
    ).items.map(({ id }) => id);
  expect(await ids(`personId=${people[0]?.accountId}`)).toEqual([a.id]);
  expect(await ids("state=cancelled")).toEqual([b.id]);
  expect(await ids(`pointId=${a.pointId}`)).toEqual([a.id]);
  expect(await ids(`pointId=${a.pointId}&state=cancelled`)).toEqual([]);
  const stranger = await signedIn(app, { role: "engineer" });
  expect((await stranger.get("/import-people").expect(200)).body.items).toEqual([]);
});

test("every row with a problem is downloaded in the asker's language, not a few examples", async () => {
  const agent = await signedIn(app, { role: "billingClerk" });
  const { organisationId } = agent;
  const surveyor = await signedIn(app, { role: "surveyor", organisationId });
  const at = await opened(surveyor);
  const rows = Array.from({ length: 3000 }, (_, i) => {
    const time = new Date(Date.UTC(2025, 6, 14) + i * 60_000).toISOString();
    return `${time},${i % 2 === 1 ? "12x" : "28.80"},6.90,12.80`;
  });
  const text = ["time,flow m3/h,supply °C,return °C", ...rows].join("\n");
  await surveyor.post(`/imports/${at.id}/files`).attach("file", Buffer.from(text), "log.csv");
  const early = await agent.get(`/imports/${at.id}/problem-rows.csv`).expect(409);
  expect(early.body.code).toBe("file-not-recognised");
  await runJobs(app);
  const answer = await agent.get(`/imports/${at.id}/problem-rows.csv?language=de`).expect(200);
  expect(answer.headers["content-type"]).toBe("text/csv; charset=utf-8");
  expect(answer.headers["content-disposition"]).toContain("Problemzeilen.csv");
  const records = answer.text.trim().split("\r\n");
  expect(records).toHaveLength(1 + 1500);
  expect(records[1]).toBe(
    `log.csv,3,"${rows[1]}",flow m3/h,12x,unreadableCell,In dieser Zelle steht keine Zahl.,` +
      "Prüfen Sie das Dezimalzeichen der Spalte oder berichtigen Sie die Zelle.",
  );
});
