import type { BatchDetail, BatchFile } from "@shared/contracts/import-batches";
import type { ImportDetail } from "@shared/contracts/imports";
import type { RecipeDetail } from "@shared/contracts/recipes";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { evidenceOfPoint } from "@server/testing/evidence-factories";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();
// The files are of spring 2026: none of their rows may lie ahead of the day they come in.
beforeAll(() => app.clock.advance({ days: 60 }));

const two = (value: number) => String(value).padStart(2, "0");

/** Two hours of a steady logger on a day of March 2026, whose flow has no unit. */
function log(day: number, more: { serial?: string; bad?: boolean; order?: "us" } = {}): string {
  const rows = Array.from({ length: 25 }, (_, i) => {
    const date = more.order === "us" ? `03/${two(day)}/2026` : `${two(day)}/03/2026`;
    const time = `${two(6 + Math.floor(i / 12))}:${two((i % 12) * 5)}`;
    return `${date} ${time},${more.bad && i === 3 ? "12x" : "8.0"},6.90,12.80`;
  });
  const preamble = more.serial ? [`Serial number,${more.serial}`] : [];
  return [...preamble, "Time,Flow,Supply [°C],Return [°C]", ...rows, ""].join("\n");
}

async function recipeOf(agent: Agent, pointId: string): Promise<RecipeDetail> {
  const { id } = (await agent.post(`/points/${pointId}/imports`).expect(201)).body as ImportDetail;
  await agent.post(`/imports/${id}/files`).attach("file", Buffer.from(log(1)), "first.csv");
  await runJobs(app);
  const [file] = ((await agent.get(`/imports/${id}`)).body as ImportDetail).files;
  const recipe = file?.recipe as FileRecipe;
  const answered: FileRecipe = {
    ...recipe,
    columns: recipe.columns.map((column) =>
      column.meaning === "flow" ? { ...column, unit: "L/s" } : column,
    ),
    time: { format: { kind: "calendar", order: "dayMonthYear" }, clock: { kind: "utc" } },
  };
  await agent.put(`/imports/${id}/files/${file?.id}/recipe`, answered).expect(200);
  const path = `/imports/${id}/files/${file?.id}/recipes`;
  return (await agent.post(path, { name: "Logger", shared: true }).expect(201))
    .body as RecipeDetail;
}

/** A site with two points, P-<n> of the factory and one with the code East, and a recipe. */
async function twoPoints() {
  const agent = await signedIn(app, { role: "surveyor" });
  const { organisationId } = agent;
  const { site, loop, point } = await pointToMeter(app, organisationId);
  const createdAt = app.clock.date();
  const east = await MeteringPoint.create({
    organisationId,
    loopId: loop.id,
    code: "East",
    name: "East riser",
    role: "riser",
    meterSide: "return",
    createdAt,
  });
  const recipe = await recipeOf(agent, point.id);
  const body = { recipeId: recipe.id, siteId: site.id };
  const batch = (await agent.post("/import-batches", body).expect(201)).body as BatchDetail;
  return { agent, site, loop, point, east, recipe, batch };
}

async function upload(agent: Agent, batchId: string, name: string, text: string, status = 201) {
  const request = agent.post(`/import-batches/${batchId}/files`);
  const { body } = await request.attach("file", Buffer.from(text), name).expect(status);
  await runJobs(app);
  return body as BatchDetail;
}

async function read(agent: Agent, batchId: string): Promise<BatchDetail> {
  return (await agent.get(`/import-batches/${batchId}`).expect(200)).body as BatchDetail;
}

const named = (batch: BatchDetail, name: string): BatchFile => {
  const file = batch.files.find((other) => other.name === name);
  if (file === undefined) throw new Error(`no ${name} in the batch`);
  return file;
};

test("files find their points by serial and name, and those that ask nothing are imported at once", async () => {
  const { agent, point, east, batch } = await twoPoints();
  const { meter } = await evidenceOfPoint(app, agent.organisationId, point.id);
  await upload(agent, batch.id, "download 1.csv", log(2, { serial: meter.serial }));
  await upload(agent, batch.id, "east week 9.csv", log(3, { bad: true }));
  await upload(agent, batch.id, "unknown.csv", log(4));
  const before = await read(agent, batch.id);
  expect(
    before.files.map(({ name, state, pointBy, point: at }) => [name, state, pointBy, at?.code]),
  ).toEqual([
    ["download 1.csv", "ready", "serial", point.code],
    ["east week 9.csv", "ready", "fileName", "East"],
    ["unknown.csv", "askingPoint", null, undefined],
  ]);
  expect(named(before, "east week 9.csv").rows).toEqual({
    read: 25,
    used: 24,
    leftOut: 0,
    excluded: 0,
    noReading: 1,
  });
  expect(named(before, "unknown.csv").problems.map(({ code }) => code)).toEqual(["pointUnknown"]);
  expect(before).toMatchObject({ ready: 2, can: { edit: true, confirm: true } });

  const confirmed = await agent.post(`/import-batches/${batch.id}/confirm`).expect(202);
  expect(confirmed.body.refused).toEqual([]);
  await runJobs(app);
  const after = await read(agent, batch.id);
  expect(after.files.map(({ state }) => state)).toEqual(["imported", "imported", "askingPoint"]);
  // 28.8 m³/h, 6.90 → 12.80 °C, meter on the return: 197.798 kW over two hours.
  const figure = named(after, "download 1.csv").cooling;
  expect(figure?.kwh).toBeCloseTo(2 * 197.798, 2);
  expect(figure?.expandedKwh).toBeGreaterThan(0);
  expect(after).toMatchObject({ ready: 0, can: { confirm: false } });

  const unknown = named(after, "unknown.csv");
  const path = `/import-batches/${batch.id}/files/${unknown.id}`;
  await agent.put(`${path}/points/${east.id}`).expect(200);
  await runJobs(app);
  const chosen = named(await read(agent, batch.id), "unknown.csv");
  expect(chosen).toMatchObject({ state: "ready", pointBy: "chosen", point: { code: "East" } });
  const stored = named(after, "download 1.csv");
  const refused = await agent.delete(`/import-batches/${batch.id}/files/${stored.id}`).expect(409);
  expect(refused.body.code).toBe("file-imported");
});

test("a file that contradicts the recipe waits with its question and holds nothing else up", async () => {
  const { agent, batch } = await twoPoints();
  await upload(agent, batch.id, "east 1.csv", log(5));
  await upload(agent, batch.id, "east 2.csv", log(25, { order: "us" }));
  const report = await read(agent, batch.id);
  expect(named(report, "east 1.csv").state).toBe("ready");
  const odd = named(report, "east 2.csv");
  expect(odd.state).toBe("asking");
  expect(odd.problems).toEqual([
    { code: "recipeDiffers", count: 1, detail: null },
    { code: "questionsOpen", count: 1, detail: null },
  ]);
  await agent.post(`/import-batches/${batch.id}/confirm`).expect(202);
  await runJobs(app);
  const after = await read(agent, batch.id);
  expect(after.files.map(({ state }) => state)).toEqual(["imported", "asking"]);
});

test("rows from before a logger came to the point are held back until somebody says they are its", async () => {
  const { agent, point, batch } = await twoPoints();
  const { meter } = await evidenceOfPoint(app, agent.organisationId, point.id);
  const early = log(2, { serial: meter.serial }).replace(/\/03\/2026/g, "/01/2026");
  await upload(agent, batch.id, "early.csv", early);
  const doubtful = named(await read(agent, batch.id), "early.csv");
  expect(doubtful).toMatchObject({ state: "ready", pointBy: "serial" });
  expect(doubtful.problems).toEqual([{ code: "pointDoubtful", count: null, detail: meter.serial }]);
  await agent.post(`/import-batches/${batch.id}/confirm`).expect(202);
  await runJobs(app);
  expect(named(await read(agent, batch.id), "early.csv").state).toBe("ready");
  const path = `/import-batches/${batch.id}/files/${doubtful.id}/points/${point.id}`;
  await agent.put(path).expect(200);
  expect(await read(agent, batch.id)).toMatchObject({ ready: 1 });
  expect(named(await read(agent, batch.id), "early.csv").importId).toBe(doubtful.importId);
});

test("another point takes the file along, and the import it was ends", async () => {
  const { agent, point, batch } = await twoPoints();
  await upload(agent, batch.id, "east 1.csv", log(6));
  const before = named(await read(agent, batch.id), "east 1.csv");
  const path = `/import-batches/${batch.id}/files/${before.id}/points/${point.id}`;
  await agent.put(path).expect(200);
  await runJobs(app);
  const after = named(await read(agent, batch.id), "east 1.csv");
  expect(after).toMatchObject({ state: "ready", point: { code: point.code } });
  expect((await agent.get(`/imports/${before.importId}`)).body.state).toBe("cancelled");
});

test("the same bytes come once into a batch, and bytes stored before are named", async () => {
  const { agent, batch, recipe, site } = await twoPoints();
  await upload(agent, batch.id, "east 1.csv", log(7));
  const twice = await agent
    .post(`/import-batches/${batch.id}/files`)
    .attach("file", Buffer.from(log(7)), "east again.csv")
    .expect(409);
  expect(twice.body.code).toBe("file-already-there");
  await agent.post(`/import-batches/${batch.id}/confirm`).expect(202);
  await runJobs(app);
  const body = { recipeId: recipe.id, siteId: site.id };
  const other = (await agent.post("/import-batches", body).expect(201)).body as BatchDetail;
  await upload(agent, other.id, "east 1.csv", log(7));
  const report = await read(agent, other.id);
  expect(report.ready).toBe(0);
  expect(report.files[0]?.problems.map(({ code }) => code)).toContain("sameFile");
});

test("the report is a CSV with one file a record, and names a person typed run as no formula", async () => {
  const { agent, batch } = await twoPoints();
  await upload(agent, batch.id, "=east 1.csv", log(8));
  const { text } = await agent.get(`/import-batches/${batch.id}/report.csv`).expect(200);
  const [head, record] = text.replace("\uFEFF", "").split("\r\n");
  expect(head?.split(",").slice(0, 3)).toEqual(["File", "Loop", "Point"]);
  expect(record).toMatch(
    /^'=east 1\.csv,CHW-\d+,East,fileName,,ready,25,25,0,0,0,2026-03-08T06:00/,
  );
});

test("a file left in a batch without a point can be taken out, and what is stored cannot", async () => {
  const { agent, batch } = await twoPoints();
  await upload(agent, batch.id, "unknown.csv", log(9));
  const file = named(await read(agent, batch.id), "unknown.csv");
  await agent.delete(`/import-batches/${batch.id}/files/${file.id}`).expect(200);
  expect((await read(agent, batch.id)).files).toEqual([]);
});

test("recipes and sites of others open no batch", async () => {
  const { recipe, site } = await twoPoints();
  const stranger = await signedIn(app, { role: "engineer" });
  const own = await pointToMeter(app, stranger.organisationId);
  for (const body of [
    { recipeId: recipe.id, siteId: own.site.id },
    { recipeId: recipe.id, siteId: site.id },
  ])
    await stranger.post("/import-batches", body).expect(404);
  expect(await Loop.count({ where: { organisationId: stranger.organisationId } })).toBe(1);
});

test("a site that holds a batch is archived, not removed, and then takes no other", async () => {
  const { agent, recipe } = await twoPoints();
  const engineer = await signedIn(app, {
    role: "engineer",
    organisationId: agent.organisationId,
  });
  const fields = { name: "Bare", zone: "UTC", currency: "EUR" };
  const site = (await engineer.post("/sites", fields).expect(201)).body;
  const body = { recipeId: recipe.id, siteId: site.id };
  await agent.post("/import-batches", body).expect(201);
  const refusal = await engineer.delete(`/sites/${site.id}`).expect(409);
  expect(refusal.body.code).toBe("holds-batches");
  await engineer.patch(`/sites/${site.id}`, { archived: true }).expect(200);
  const archived = await agent.post("/import-batches", body).expect(409);
  expect(archived.body.code).toBe("site-archived");
});
