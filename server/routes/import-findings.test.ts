import { QueryTypes } from "sequelize";
import type { Correction as CorrectionView } from "@shared/contracts/corrections";
import type { ImportDetail } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { DAY_MS, HOUR_MS, MINUTE_MS } from "@shared/domain/time/interval";
import { BoreVersion } from "@server/models/bore-version";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";
import { loadDays } from "@server/readings/day-rows";
import { cleanSeries, withoutRows, withValues } from "@test/generators/clean-series";
import { logOf } from "@test/generators/defective-log";

/*
 * For each thing the readings of a file can show: the file goes in with the defect, the check finds
 * it, a choice is made, the stored result is what was promised, and undoing restores what was before.
 */
const app = testApp();
jest.setTimeout(60_000);

const DAY = 96;
/** Tuesday 9:00 of a week of quarter-hours, when pump and temperatures have settled. */
const settled = DAY + 36;
const clean = cleanSeries({ rows: 4 * DAY });
const at = (row: number) => clean.columns.instantMs[row]!;

async function placed(agent: Agent, wishes: Parameters<typeof pointToMeter>[2] = {}) {
  const { point, loop } = await pointToMeter(app, agent.organisationId, wishes);
  await BoreVersion.create({
    organisationId: agent.organisationId,
    pointId: point.id,
    validFrom: new Date(Date.UTC(2020, 0, 1)),
    kind: "measured",
    outsideDiameterMm: 114.3,
    wallMm: 6.02,
    liningMm: 0,
    insideDiameterMm: 102.26,
  });
  return { point, loop };
}

async function read(agent: Agent, id: string): Promise<ImportDetail> {
  return (await agent.get(`/imports/${id}`).expect(200)).body as ImportDetail;
}

async function checked(agent: Agent, pointId: string, ...texts: string[]): Promise<ImportDetail> {
  const opened = await agent.post(`/points/${pointId}/imports`).expect(201);
  const { id } = opened.body as ImportDetail;
  for (const [i, text] of texts.entries())
    await agent
      .post(`/imports/${id}/files`)
      .attach("file", Buffer.from(text), `log-${i}.csv`)
      .expect(201);
  await runJobs(app);
  return read(agent, id);
}

async function choose(agent: Agent, id: string, findings: Record<string, string>, more = {}) {
  await agent.patch(`/imports/${id}/repairs`, { findings, ...more }).expect(200);
  await runJobs(app);
  return read(agent, id);
}

async function confirmed(agent: Agent, id: string): Promise<ImportDetail> {
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  return read(agent, id);
}

async function corrections(agent: Agent, pointId: string): Promise<CorrectionView[]> {
  const answer = await agent.get(`/points/${pointId}/corrections`).expect(200);
  return (answer.body as { items: CorrectionView[] }).items;
}

async function storedKwh(pointId: string) {
  const days = await loadDays(app.database, pointId, "1960-01-01", "2030-01-01");
  const sum = (of: (day: (typeof days)[number]) => number) =>
    days.reduce((total, day) => total + of(day), 0);
  return {
    heating: sum(({ totals }) => totals.heating.energyKwh),
    cooling: sum(({ totals }) => totals.cooling.energyKwh),
  };
}

async function blockHashes(pointId: string): Promise<string[]> {
  const rows = await app.database.query<{ hash: string }>(
    `SELECT SHA2(CONCAT(day, channel_set, row_count, format, HEX(data)), 256) AS hash
       FROM reading_block WHERE point_id = :pointId ORDER BY day, channel_set`,
    { replacements: { pointId }, type: QueryTypes.SELECT },
  );
  return rows.map(({ hash }) => hash);
}

const findingOf = (detail: ImportDetail, code: string) => {
  const found = (detail.checks?.findings ?? []).filter((finding) => finding.code === code);
  expect(found).toHaveLength(1);
  return found[0]!;
};

/**
 * Chooses for one finding, confirms, compares what is stored with what was promised, undoes it and
 * compares with what was before.
 */
async function settles(
  agent: Agent,
  pointId: string,
  start: ImportDetail,
  code: string,
  key: string,
) {
  const finding = findingOf(start, code);
  const before = await storedKwh(pointId);
  const kept = start.checks!.energy!;
  const chosen = await choose(agent, start.id, { [finding.key]: key });
  expect(chosen.state).toBe("ready");
  expect(findingOf(chosen, code).chosen).toBe(key);
  const energy = chosen.checks!.energy!;
  const change = finding.choices.find((choice) => choice.key === key)!.energyChangeKwh!;
  expect(change).not.toBeNull();
  if (finding.chosen === "keep" || finding.chosen === null) {
    expect(energy.coolingKwh - kept.coolingKwh).toBeCloseTo(change.cooling, 6);
    expect(energy.heatingKwh - kept.heatingKwh).toBeCloseTo(change.heating, 6);
  }
  const imported = await confirmed(agent, start.id);
  expect(imported.state).toBe("imported");
  const stored = await storedKwh(pointId);
  expect(stored.cooling - before.cooling).toBeCloseTo(energy.coolingKwh, 6);
  expect(stored.heating - before.heating).toBeCloseTo(energy.heatingKwh, 6);
  const made = await corrections(agent, pointId);
  await agent.post(`/imports/${start.id}/undo`).expect(202);
  await runJobs(app);
  expect((await read(agent, start.id)).state).toBe("undone");
  expect(await storedKwh(pointId)).toEqual(before);
  expect((await corrections(agent, pointId)).filter(({ state }) => state === "applied")).toEqual(
    [],
  );
  return { finding, chosen, energy, made };
}

async function engineerAtPoint(wishes: Parameters<typeof placed>[1] = {}) {
  const agent = await signedIn(app, { role: "engineer" });
  return { agent, ...(await placed(agent, wishes)) };
}

test("a clean log shows nothing, and says what could not be checked", async () => {
  const { agent, point } = await engineerAtPoint();
  const { checks, state } = await checked(agent, point.id, logOf(clean));
  expect(state).toBe("ready");
  expect(checks?.findings).toEqual([]);
  expect(checks?.notChecked).toEqual([
    { check: "clockOff", lacks: "clockNotes", fileId: expect.any(String) as string },
  ]);
  expect(checks?.clean).toEqual(expect.arrayContaining(["swappedSides", "spikes", "stepChange"]));
  expect(checks?.clean).not.toContain("clockOff");
});

test("spikes are left out, one of them stays in, and undoing restores the readings", async () => {
  const { agent, point } = await engineerAtPoint();
  const rows = [settled, settled + 20];
  const log = logOf(
    withValues(clean, "flowM3PerHour", (v, row) => (rows.includes(row) ? v * 12 : v)),
  );
  const start = await checked(agent, point.id, log);
  expect(start.state).toBe("ready");
  const { finding, made } = await settles(agent, point.id, start, "spikes", "exclude");
  expect(finding).toMatchObject({ channel: "flowM3PerHour", rowCount: 2, spanCount: 2 });
  expect(finding.picture?.channels[0]?.values.length).toBeLessThanOrEqual(120);
  expect(finding.choices[0]!.energyChangeKwh!.cooling).toBeLessThan(-100);
  expect(made).toMatchObject([
    {
      state: "applied",
      importId: start.id,
      change: { kind: "exclude", parts: [{}, {}] },
      reason: "Spikes (flow): found and chosen when log-0.csv was imported",
      effect: { rowsChanged: 2 },
    },
  ]);

  const again = await checked(agent, point.id, log.replace("time,", "Time,"));
  const one = findingOf(again, "spikes");
  const keptSpans = { [one.key]: [one.spans[0]!.from] };
  const chosen = await choose(agent, again.id, { [one.key]: "exclude" }, { keptSpans });
  expect(chosen.checks?.rows).toMatchObject({ excluded: 1 });
  expect(findingOf(chosen, "spikes").keptSpans).toEqual(keptSpans[one.key]);
  await confirmed(agent, again.id);
  const [correction] = await corrections(agent, point.id);
  expect(correction?.change).toMatchObject({ from: new Date(at(settled + 20)).toISOString() });
});

test("swapped sides stop the import until somebody chooses, and are swapped for this file", async () => {
  const { agent, point } = await engineerAtPoint();
  const { supplyC, returnC } = clean.columns;
  const swapped = { ...clean, columns: { ...clean.columns, supplyC: returnC, returnC: supplyC } };
  const start = await checked(agent, point.id, logOf(swapped));
  expect(start).toMatchObject({ state: "asking", checks: { undecided: ["findings"] } });
  const found = findingOf(start, "swappedSides");
  expect(found).toMatchObject({ weight: "stop", chosen: null });
  const refused = await agent.post(`/imports/${start.id}/confirm`).expect(409);
  expect((refused.body as { remedy: string }).remedy).toBeTruthy();
  const wrong = await agent.patch(`/imports/${start.id}/repairs`, {
    findings: { [found.key]: "flipFlow" },
  });
  expect(wrong.status).toBe(422);
  const { made, energy } = await settles(
    agent,
    point.id,
    start,
    "swappedSides",
    "swapSides:probes",
  );
  expect(made).toMatchObject([{ change: { kind: "swapSides", swapped: "probes" } }]);
  expect(energy.coolingKwh).toBeGreaterThan(500);
});

test("flow that counts backwards is turned as a whole", async () => {
  const { agent, point } = await engineerAtPoint();
  const turned = withValues(clean, "flowM3PerHour", (value) => 0 - value);
  const start = await checked(agent, point.id, logOf(turned));
  expect(start.checks?.undecided).toEqual(["findings"]);
  const { energy } = await settles(agent, point.id, start, "reversedFlow", "flipFlow");
  expect(energy.coolingKwh).toBeGreaterThan(500);
});

test("flow that turns at the end of the file is turned from there on", async () => {
  const { agent, point } = await engineerAtPoint();
  const turned = withValues(clean, "flowM3PerHour", (value, row) =>
    row >= 3 * DAY + 40 ? 0 - value : value,
  );
  const start = await checked(agent, point.id, logOf(turned));
  const finding = findingOf(start, "flowTurns");
  expect(finding.choices.map(({ key }) => key)).toEqual(["exclude", "keep"]);
  await settles(agent, point.id, start, "flowTurns", "exclude");
});

test("flow back at a stop is for the record, and can be left out", async () => {
  const { agent, point } = await engineerAtPoint();
  const back = withValues(clean, "flowM3PerHour", (value, row) => (row === DAY + 80 ? -3 : value));
  const start = await checked(agent, point.id, logOf(back));
  const { finding } = await settles(agent, point.id, start, "backflow", "exclude");
  expect(finding).toMatchObject({ weight: "note", chosen: "keep", rowCount: 1 });
});

test("a probe that stood still is left out while it did", async () => {
  const { agent, point } = await engineerAtPoint();
  const held = clean.columns.returnC![settled]!;
  const stuck = withValues(clean, "returnC", (value, row) =>
    row >= settled && row < settled + 36 ? held : value,
  );
  const start = await checked(agent, point.id, logOf(stuck));
  const { finding } = await settles(agent, point.id, start, "stuckChannel", "exclude");
  expect(finding.picture?.channels.map(({ channel }) => channel)).toContain("returnC");
});

test("a step splits the readings there, and nothing is joined across it", async () => {
  const { agent, point } = await engineerAtPoint();
  const row = 2 * DAY + 45;
  const stepped = withValues(clean, "returnC", (value, r) => (r >= row ? value + 1.5 : value));
  const start = await checked(agent, point.id, logOf(stepped));
  const { finding, made, chosen } = await settles(agent, point.id, start, "stepChange", "split");
  expect(made).toMatchObject([{ change: { kind: "split", at: new Date(at(row)).toISOString() } }]);
  expect(finding.choices[0]!.energyChangeKwh!.cooling).toBeLessThan(0);
  expect(start.checks!.energy!.coveredS - chosen.checks!.energy!.coveredS).toBe(900);
});

test("a flow in another unit changes the file's recipe and is checked again", async () => {
  const { agent, point } = await engineerAtPoint();
  // Numbers in L/min under a header that says m³/h.
  const wrong = withValues(clean, "flowM3PerHour", (value) => value / 0.06);
  const start = await checked(agent, point.id, logOf(wrong));
  const finding = findingOf(start, "flowUnit");
  const choice = finding.choices.find(({ key }) => key === "unit:L/min")!;
  expect(finding).toMatchObject({ weight: "stop", chosen: null });
  expect(choice.unit!.medianMPerS).toBeGreaterThan(0.3);
  const settledUnit = await choose(agent, start.id, { [finding.key]: "unit:L/min" });
  expect(settledUnit).toMatchObject({ state: "ready", checks: { findings: [] } });
  const flow = settledUnit.files[0]!.recipe!.columns.find(({ meaning }) => meaning === "flow");
  expect(flow?.unit).toBe("L/min");
  const energy = settledUnit.checks!.energy!.coolingKwh;
  expect(energy - start.checks!.energy!.coolingKwh).toBeCloseTo(choice.energyChangeKwh!.cooling, 4);
  await confirmed(agent, start.id);
  expect((await storedKwh(point.id)).cooling).toBeCloseTo(energy, 6);
  expect(await corrections(agent, point.id)).toEqual([]);
});

test("temperatures in another unit change the file's recipe", async () => {
  const { agent, point } = await engineerAtPoint();
  const fahrenheit = (value: number) => value * 1.8 + 32;
  const wrong = withValues(withValues(clean, "supplyC", fahrenheit), "returnC", fahrenheit);
  const start = await checked(agent, point.id, logOf(wrong));
  const finding = findingOf(start, "temperatureUnit");
  const settledUnit = await choose(agent, start.id, { [finding.key]: "unit:degF" });
  expect(settledUnit).toMatchObject({ state: "ready", checks: { findings: [] } });
  const units = settledUnit.files[0]!.recipe!.columns.map(({ unit }) => unit);
  expect(units.filter((unit) => unit === "degF")).toHaveLength(2);
});

test("rows of a lost clock far from the rest are left out", async () => {
  const { agent, point } = await engineerAtPoint();
  const lost = [0, 1].map((row) => {
    const ms = Date.UTC(2024, 4, 1) + row * 15 * MINUTE_MS;
    return `${new Date(ms).toISOString()},10.00,7.00,12.00`;
  });
  const [header, ...lines] = logOf(clean).split("\n");
  const start = await checked(agent, point.id, [header, ...lost, ...lines].join("\n"));
  const { finding, energy } = await settles(agent, point.id, start, "farDates", "exclude");
  expect(finding).toMatchObject({ weight: "stop", rowCount: 2 });
  expect(energy.coolingKwh).toBeGreaterThan(500);
});

test("flow too small to be told from none names a cut-off and what it would suppress", async () => {
  const { agent, point } = await engineerAtPoint();
  const noisy = withValues(clean, "flowM3PerHour", (value) => (value === 0 ? 0.12 : value));
  const start = await checked(agent, point.id, logOf(noisy));
  const finding = findingOf(start, "noFlowNoise");
  expect(finding).toMatchObject({ weight: "note", chosen: "keep" });
  const [cutOff] = finding.choices;
  expect(cutOff).toMatchObject({
    key: "cutOff",
    cutOff: { suppressedKwh: expect.any(Number) as number },
  });
  expect(cutOff!.cutOff!.suppressedKwh).toBeGreaterThan(0);
  expect(start.state).toBe("ready");
});

test("a clock that notes show to be off is put right, with the choices beside it", async () => {
  const { agent, point } = await engineerAtPoint();
  const spiked = withValues(clean, "flowM3PerHour", (v, row) => (row === settled ? v * 12 : v));
  const start = await checked(agent, point.id, logOf(spiked));
  const [file] = start.files;
  const recipe = file!.recipe as FileRecipe;
  const note = (ms: number, slowS: number) => ({
    loggerAt: new Date(ms).toISOString(),
    rightAt: new Date(ms + slowS * 1000).toISOString(),
  });
  const notes = [note(at(0), 1800), note(at(0) + 2 * DAY_MS, 1860)];
  const noted = { ...recipe, time: { ...recipe.time, notes } };
  await agent.put(`/imports/${start.id}/files/${file!.id}/recipe`, noted).expect(200);
  await runJobs(app);
  const again = await read(agent, start.id);
  const clock = findingOf(again, "clockOff");
  expect(clock.figures).toMatchObject({
    offsetS: 1800,
    driftSPerDay: expect.closeTo(30, 6) as number,
  });
  const spikes = findingOf(again, "spikes");
  await choose(agent, start.id, { [spikes.key]: "exclude" });
  const { made } = await settles(agent, point.id, await read(agent, start.id), "clockOff", "clock");
  expect(made.map(({ change }) => change.kind).sort()).toEqual(["clock", "exclude"]);
  const left = made.find(({ change }) => change.kind === "exclude")!.change;
  const moved = at(settled) + 1_800_000 + 30_000 * ((at(settled) - at(0)) / DAY_MS);
  expect(left).toMatchObject({ from: new Date(Math.round(moved)).toISOString() });
});

test("two loggers whose edges lie an hour apart get a hint, and no correction of it", async () => {
  const { agent, point } = await engineerAtPoint();
  const week = cleanSeries({ rows: 12 * 24 * 7, stepMs: 5 * MINUTE_MS });
  const late: ReadingSegment = {
    ...week,
    columns: { ...week.columns, instantMs: week.columns.instantMs.map((ms) => ms + HOUR_MS) },
  };
  const start = await checked(
    agent,
    point.id,
    logOf(week, { only: "flow" }),
    logOf(late, { only: "temperatures" }),
  );
  const hint = findingOf(start, "clockHint");
  expect(hint).toMatchObject({ weight: "note", fileId: null });
  expect(hint.figures.lagMinutes).toBeCloseTo(60, -1);
  expect(hint.choices.map(({ key }) => key)).toEqual(["keep"]);
});

test("a gap stays a gap and is no finding of its own", async () => {
  const { agent, point } = await engineerAtPoint();
  const gone = withoutRows(clean, (row) => row > settled && row < settled + 12);
  const { checks } = await checked(agent, point.id, logOf(gone));
  expect(checks?.findings).toEqual([]);
  expect(checks?.files[0]?.gapCount).toBe(1);
});

test("the same choices give byte-identical readings and equal corrections at another point", async () => {
  const { agent, point } = await engineerAtPoint();
  const { point: other } = await placed(agent);
  const { supplyC, returnC } = clean.columns;
  const swapped = { ...clean, columns: { ...clean.columns, supplyC: returnC, returnC: supplyC } };
  const log = logOf(
    withValues(swapped, "flowM3PerHour", (v, row) => (row === settled ? v * 12 : v)),
  );
  const outcomes = [];
  for (const { id } of [point, other]) {
    const start = await checked(agent, id, log);
    const findings = Object.fromEntries(
      start.checks!.findings!.map(({ key, choices }) => [key, choices[0]!.key]),
    );
    await choose(agent, start.id, findings);
    await confirmed(agent, start.id);
    const made = await corrections(agent, id);
    outcomes.push({
      findings,
      hashes: await blockHashes(id),
      changes: made.map(({ change, effect }) => ({ change, effect })),
      energy: await storedKwh(id),
    });
  }
  expect(outcomes[0]!.hashes.length).toBeGreaterThan(0);
  expect(outcomes[1]).toEqual(outcomes[0]);
});
