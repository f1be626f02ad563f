import type { EnergyAnswer, PointSummary } from "@shared/contracts/energy";
import type { Loop, Point, Site } from "@shared/contracts/places";
import type { BathCheck, Installation } from "@shared/contracts/evidence";
import type { ImportSummary } from "@shared/contracts/imports";
import { Account } from "@server/models/account";
import { LogImport } from "@server/models/log-import";
import { Membership } from "@server/models/membership";
import { ensureDemoPeople } from "@server/start-up/demo-people";
import { sessionOf, type Agent } from "@server/testing/factories";
import { testApp } from "@server/testing/test-app";
import { seedDemo } from "./seed-demo";

const app = testApp({ logLevel: "error" });

// Five weeks instead of thirteen months: the same files, points and faults in a tenth of the rows.
const options = { historyDays: 35 };
const week = "from=2026-05-11&to=2026-05-18";

let engineer: Agent;

async function demoEngineer(): Promise<Agent> {
  const membership = await Membership.findOne({
    where: { role: "engineer" },
    rejectOnEmpty: true,
  });
  const account = await Account.findByPk(membership.accountId ?? "", { rejectOnEmpty: true });
  return sessionOf(app, { account, membership, organisationId: membership.organisationId });
}

async function imported(): Promise<number> {
  return LogImport.count({ where: { state: "imported" } });
}

beforeAll(async () => {
  const { services } = app;
  // Tuesday 19 May 2026: the last whole week begins on the 11th.
  app.clock.advance({ days: 78 });
  const organisation = await ensureDemoPeople(services);
  services.jobs.start();
  const cut = new AbortController();
  const first = seedDemo(services, organisation, { ...options, signal: cut.signal });
  const ended = expect(first).rejects.toThrow(/aborted/);
  while ((await imported()) < 3) await new Promise((resolve) => setTimeout(resolve, 50));
  cut.abort();
  await ended;
  expect(await imported()).toBeLessThan(10);
  await seedDemo(services, organisation, options);
  engineer = await demoEngineer();
}, 120_000);

afterAll(() => app.services.jobs.stop());

async function get<Answer>(path: string): Promise<Answer> {
  return (await engineer.get(path).expect(200)).body as Answer;
}

async function pointOf(tag: string): Promise<string> {
  const [site] = (await get<{ items: Site[] }>("/sites")).items;
  const loops = await get<{ items: Loop[] }>(`/sites/${site?.id}/loops`);
  const loop = loops.items.find((one) => one.tag === tag);
  const [point] = (await get<{ items: Point[] }>(`/loops/${loop?.id}/points`)).items;
  return point?.id ?? "";
}

const coolingKwh = async (tag: string) =>
  (await get<EnergyAnswer>(`/points/${await pointOf(tag)}/energy?${week}&step=total`)).totals
    .cooling.energyKwh ?? NaN;

test("a seeding that was cut short is completed without doubles, and a whole one is left alone", async () => {
  const { items } = await get<{ items: ImportSummary[] }>("/imports?limit=100");
  expect(items.map(({ state }) => state)).toEqual(Array(10).fill("imported"));
  expect(new Set(items.flatMap(({ fileNames }) => fileNames)).size).toBe(10);
  expect(new Set(items.map(({ createdBy }) => createdBy))).toEqual(new Set(["Imogen Tarr"]));
  const sites = await get<{ items: Site[] }>("/sites");
  expect(sites.items).toMatchObject([{ name: "Harbour Court Works", isDemo: true, loopCount: 8 }]);

  await LogImport.update({ state: "undone" }, { where: { id: items[0]?.id ?? "" } });
  await seedDemo(app.services, await ensureDemoPeople(app.services), options);
  expect(await imported()).toBe(9);
  expect(await LogImport.count()).toBe(10);
});

test("the last whole week of Ropewalk House shows the faults that were put into its log", async () => {
  const summary = await get<PointSummary>(`/points/${await pointOf("CHW-1B")}/summary?${week}`);
  expect(summary.leftOut.map(({ kind, rows }) => [kind, rows])).toEqual([
    ["missing", 55],
    ["excluded", 37],
    ["missing", 51],
  ]);
  expect(summary.totals.rows).toMatchObject({ excluded: 37, expected: 7 * 24 * 60 });
});

test("a May week is of the size such a building has, and the main exceeds its branches", async () => {
  const ropewalk = await coolingKwh("CHW-1B");
  expect(ropewalk).toBeGreaterThan(12_000);
  expect(ropewalk).toBeLessThan(18_000);
  const branches = ropewalk + (await coolingKwh("CHW-1A")) + (await coolingKwh("CHW-1C"));
  const unmetered = (await coolingKwh("CHW-1")) - branches;
  expect(unmetered).toBeGreaterThan(500);
  expect(unmetered).toBeLessThan(0.15 * branches);
});

test("the evidence of the demo's points is on record, with its gaps", async () => {
  const codesOf = async (tag: string) => {
    const path = `/points/${await pointOf(tag)}/installations`;
    const { items } = await get<{ items: Installation[] }>(path);
    expect(items).toHaveLength(1);
    return items.flatMap(({ verdicts }) => verdicts.map(({ code }) => code));
  };
  expect(await codesOf("CHW-1B")).toEqual(
    expect.arrayContaining(["certificateInDate", "bathCheckFine", "soundSpeedPlausible"]),
  );
  expect(await codesOf("CHW-1C")).toContain("bathCheckMissing");
  expect(await codesOf("LTHW-4")).toContain("certificateLapsed");
  expect((await get<{ items: BathCheck[] }>("/bath-checks")).items).toHaveLength(2);
});

test("there is no demo in production", async () => {
  const { services } = app;
  const production = { ...services, config: { ...services.config, mode: "production" as const } };
  const organisation = await ensureDemoPeople(services);
  await expect(seedDemo(production, organisation)).rejects.toThrow(/production/);
});
