import type { ImportDetail } from "@shared/contracts/imports";
import type { RecipeDetail, RecipeOffer, RecipeSummary } from "@shared/contracts/recipes";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { AuditEvent } from "@server/models/audit-event";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();
// The files are of spring 2026: none of their rows may lie ahead of the day they come in.
beforeAll(() => app.clock.advance({ days: 60 }));

const two = (value: number) => String(value).padStart(2, "0");

interface LogWishes {
  serial?: string | null;
  header?: string;
  /** Of April 2026, day first unless `date` writes another way. */
  day?: number;
  date?: (minute: number) => string;
  values?: string;
}

/** A logger that leaves flow unit, date order and clock to be asked, a minute apart. */
function log({ serial = "LG-0712", header, day = 3, date, values }: LogWishes = {}): string {
  const rows = Array.from({ length: 40 }, (_, minute) => {
    const at = date?.(minute) ?? `${two(day)}/04/2026 08:${two(minute)}`;
    return `${at},${values ?? `8.${minute % 10}0,6.90,12.80`}`;
  });
  return [
    ...(serial === null ? [] : [`Serial number,${serial}`]),
    header ?? "Time,Flow,Supply [°C],Return [°C]",
    ...rows,
    "",
  ].join("\n");
}

async function read(agent: Agent, importId: string): Promise<ImportDetail> {
  return (await agent.get(`/imports/${importId}`).expect(200)).body as ImportDetail;
}

/** An import of a new point (of the agent's organisation) with one recognised file. */
async function begun(agent: Agent, text: string): Promise<{ id: string; fileId: string }> {
  const { point } = await pointToMeter(app, agent.organisationId);
  const { id } = (await agent.post(`/points/${point.id}/imports`).expect(201)).body as ImportDetail;
  await agent.post(`/imports/${id}/files`).attach("file", Buffer.from(text), "log.csv").expect(201);
  await runJobs(app);
  const fileId = (await read(agent, id)).files[0]?.id ?? "";
  return { id, fileId };
}

function withAnswers(recipe: FileRecipe): FileRecipe {
  return {
    ...recipe,
    columns: recipe.columns.map((column) =>
      column.meaning === "flow" ? { ...column, unit: "L/s" } : column,
    ),
    time: { format: { kind: "calendar", order: "dayMonthYear" }, clock: { kind: "utc" } },
  };
}

async function answer(agent: Agent, { id, fileId }: { id: string; fileId: string }): Promise<void> {
  const [file] = (await read(agent, id)).files;
  const recipe = withAnswers(file?.recipe as FileRecipe);
  await agent.put(`/imports/${id}/files/${fileId}/recipe`, recipe).expect(200);
  await runJobs(app);
}

async function savedBy(agent: Agent, name: string, shared: boolean, text = log()) {
  const at = await begun(agent, text);
  await answer(agent, at);
  const path = `/imports/${at.id}/files/${at.fileId}/recipes`;
  return (await agent.post(path, { name, shared }).expect(201)).body as RecipeDetail;
}

async function offer(agent: Agent, at: { id: string; fileId: string }): Promise<RecipeOffer> {
  const path = `/imports/${at.id}/files/${at.fileId}/recipes`;
  return (await agent.get(path).expect(200)).body as RecipeOffer;
}

async function apply(agent: Agent, at: { id: string; fileId: string }, recipeId: string) {
  const path = `/imports/${at.id}/files/${at.fileId}/recipes/${recipeId}/apply`;
  const { body } = await agent.post(path).expect(200);
  return body as ImportDetail;
}

async function list(agent: Agent): Promise<RecipeSummary[]> {
  return ((await agent.get("/recipes").expect(200)).body as { items: RecipeSummary[] }).items;
}

test("answers are saved, offered for the next file of the logger, and then nothing is asked", async () => {
  const surveyor = await signedIn(app, { role: "surveyor" });
  const first = await begun(surveyor, log());
  const unanswered = `/imports/${first.id}/files/${first.fileId}/recipes`;
  const early = await surveyor.post(unanswered, { name: "Early", shared: false }).expect(409);
  expect(early.body.code).toBe("questions-open");
  await answer(surveyor, first);
  expect(await offer(surveyor, first)).toMatchObject({
    applied: null,
    matches: [],
    loggerSerial: "LG-0712",
    proposedName: "LG-0712",
  });
  const saved = (
    await surveyor.post(unanswered, { name: "Plant room logger", shared: false }).expect(201)
  ).body as RecipeDetail;
  expect(saved).toMatchObject({
    loggerSerial: "LG-0712",
    headers: ["Time", "Flow", "Supply [°C]", "Return [°C]"],
    version: 1,
    lastUsedAt: null,
    can: { edit: true, use: true },
  });

  const next = await begun(surveyor, log({ day: 4 }));
  expect((await read(surveyor, next.id)).state).toBe("asking");
  const offered = await offer(surveyor, next);
  expect(offered.matches).toEqual([
    expect.objectContaining({ id: saved.id, name: "Plant room logger", by: "serialAndHeader" }),
  ]);
  const applied = await apply(surveyor, next, saved.id);
  expect(applied.files[0]?.questions).toEqual([]);
  expect(applied.files[0]?.recipe?.columns[1]).toMatchObject({ meaning: "flow", unit: "L/s" });
  await runJobs(app);
  expect((await read(surveyor, next.id)).state).toBe("ready");
  expect((await offer(surveyor, next)).applied).toMatchObject({
    recipeId: saved.id,
    name: "Plant room logger",
    version: 1,
    appliedBy: surveyor.account.name,
    differences: [],
  });
  expect((await list(surveyor))[0]?.lastUsedAt).not.toBeNull();
  const events = await AuditEvent.findAll({ where: { kind: "recipe-applied" } });
  expect(events.map(({ subjectId }) => subjectId)).toContain(next.id);
});

test("a recipe of another logger with the same header is offered after that of the same one", async () => {
  const engineer = await signedIn(app, { role: "engineer" });
  const other = await savedBy(engineer, "Other", true, log({ serial: "LG-0001" }));
  const same = await savedBy(engineer, "Same", true);
  await savedBy(engineer, "Another header", true, log({ header: "Time,Q,TS [°C],TR [°C]" }));
  const at = await begun(engineer, log({ day: 5 }));
  expect((await offer(engineer, at)).matches.map(({ id, by }) => [id, by])).toEqual([
    [same.id, "serialAndHeader"],
    [other.id, "header"],
  ]);
});

test("what a new file disproves is not taken over: it is listed and asked, and nothing is stored", async () => {
  const engineer = await signedIn(app, { role: "engineer" });
  const saved = await savedBy(engineer, "Day first", true);
  const at = await begun(engineer, log({ date: (minute) => `04/13/2026 08:${two(minute)}` }));
  const applied = await apply(engineer, at, saved.id);
  expect(applied.state).toBe("asking");
  expect(applied.files[0]?.questions.map(({ code }) => code)).toEqual(["dateOrder"]);
  expect((await offer(engineer, at)).applied?.differences).toEqual([
    expect.objectContaining({ code: "dateOrder", saved: "dayMonthYear", asks: true }),
  ]);
  await engineer.post(`/imports/${at.id}/confirm`).expect(409);
});

test("choices about defects come along, except how another import is met", async () => {
  const engineer = await signedIn(app, { role: "engineer" });
  const first = await begun(engineer, log());
  await answer(engineer, first);
  const choices = {
    conflictingRepeats: "keepLast",
    weakSignalBelowPercent: 55,
    overlap: "useThis",
  };
  await engineer.patch(`/imports/${first.id}/repairs`, choices).expect(200);
  const path = `/imports/${first.id}/files/${first.fileId}/recipes`;
  const saved = (await engineer.post(path, { name: "With choices", shared: true }).expect(201))
    .body as RecipeDetail;
  const at = await begun(engineer, log({ day: 6 }));
  const { repair } = await apply(engineer, at, saved.id);
  expect(repair).toMatchObject({ conflictingRepeats: "keepLast", weakSignalBelowPercent: 55 });
  expect(repair.overlap).toBeNull();
});

test("one's own recipe is nobody else's, until it is shared", async () => {
  const owner = await signedIn(app, { role: "surveyor" });
  const { organisationId } = owner;
  const colleague = await signedIn(app, { role: "engineer", organisationId });
  const saved = await savedBy(owner, "Mine", false);
  expect(await list(colleague)).toEqual([]);
  await colleague.get(`/recipes/${saved.id}`).expect(404);
  const at = await begun(colleague, log({ day: 7 }));
  expect((await offer(colleague, at)).matches).toEqual([]);
  const path = `/imports/${at.id}/files/${at.fileId}/recipes/${saved.id}/apply`;
  await colleague.post(path).expect(404);

  await owner.patch(`/recipes/${saved.id}`, { version: 1, shared: true }).expect(200);
  expect((await list(colleague))[0]).toMatchObject({ id: saved.id, can: { edit: false } });
  expect((await offer(colleague, at)).matches).toHaveLength(1);
  const denied = await colleague.patch(`/recipes/${saved.id}`, { version: 2, name: "Ours" });
  expect([denied.status, denied.body.code]).toEqual([403, "denied"]);
  await colleague.delete(`/recipes/${saved.id}`).expect(403);
  const administrator = await signedIn(app, { role: "administrator", organisationId });
  await administrator.delete(`/recipes/${saved.id}`).expect(200);
  expect(await list(owner)).toEqual([]);
});

test("a change names the version it was made on; an older one and a taken name are refused", async () => {
  const engineer = await signedIn(app, { role: "engineer" });
  const saved = await savedBy(engineer, "First", true);
  await savedBy(engineer, "Second", true, log({ serial: null }));
  const path = `/recipes/${saved.id}`;
  const columns = saved.recipe.columns.map((column) =>
    column.meaning === "flow" ? { ...column, unit: "L/min" as const } : column,
  );
  const changed = (await engineer.patch(path, { version: 1, columns }).expect(200))
    .body as RecipeDetail;
  expect(changed.version).toBe(2);
  expect(changed.recipe.columns[1]?.unit).toBe("L/min");
  const stale = await engineer.patch(path, { version: 1, name: "Third" }).expect(409);
  expect(stale.body.code).toBe("recipe-changed");
  const taken = await engineer.patch(path, { version: 2, name: "second" }).expect(409);
  expect(taken.body.code).toBe("recipe-name-taken");
  const twice = changed.recipe.columns.map((column) => ({ ...column, meaning: "supply" }));
  await engineer.patch(path, { version: 2, columns: twice }).expect(422);
  const renamed = changed.recipe.columns.map((column) => ({ ...column, header: "X" }));
  const others = await engineer.patch(path, { version: 2, columns: renamed }).expect(422);
  expect(others.body.errors[0].code).toBe("other-columns");
});

test("a file without a header makes no recipe: nothing would tell which files it is for", async () => {
  const engineer = await signedIn(app, { role: "engineer" });
  const rows = log({ serial: null }).split("\n").slice(1).join("\n");
  const at = await begun(engineer, rows);
  const [file] = (await read(engineer, at.id)).files;
  const recipe = file?.recipe as FileRecipe;
  const meanings = ["time", "flow", "supply", "return"] as const;
  const units = [null, "L/s", "degC", "degC"] as const;
  const columns = recipe.columns.map((column, i) => ({
    ...column,
    meaning: meanings[i],
    unit: units[i],
  }));
  const answered = { ...withAnswers(recipe), columns };
  await engineer.put(`/imports/${at.id}/files/${at.fileId}/recipe`, answered).expect(200);
  const path = `/imports/${at.id}/files/${at.fileId}/recipes`;
  const refused = await engineer.post(path, { name: "Nameless", shared: true }).expect(409);
  expect(refused.body.code).toBe("no-header");
});
