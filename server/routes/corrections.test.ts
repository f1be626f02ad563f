import { QueryTypes } from "sequelize";
import type { Correction, CorrectionChange, EnergyResult } from "@shared/contracts/corrections";
import { claimJob } from "@server/jobs/job-queue";
import { runJob } from "@server/jobs/run-job";
import { Instrument } from "@server/models/instrument";
import { loadDays } from "@server/readings/day-rows";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { loggedRows, storedReadings } from "@server/testing/reading-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();
const minute = 60_000;
const from = Date.UTC(2026, 1, 2);
const at = (minutes: number) => new Date(from + minutes * minute).toISOString();
/** The worked interval of the trade's method, 28.8 m³/h on the return at 6.90 → 12.80 °C, for an hour. */
const hourKwh = 197.798;

/** A chilled loop measured for four hours at five minutes. */
async function measured(role: "engineer" | "surveyor" = "engineer") {
  const agent = await signedIn(app, { role });
  const { organisationId } = agent;
  const { point } = await pointToMeter(app, organisationId);
  const rows = loggedRows({ fromMs: from, count: 49, stepMs: 5 * minute });
  const file = await storedReadings(app, { organisationId, pointId: point.id }, rows, 5 * minute);
  return { agent, organisationId, point, file };
}

async function propose(agent: Agent, pointId: string, change: unknown): Promise<Correction> {
  const { status, body } = await agent
    .post(`/points/${pointId}/corrections`, { change, reason: "seen on the visit" })
    .expect(201);
  expect(status).toBe(201);
  await runJobs(app);
  return body as Correction;
}

async function corrected(agent: Agent, pointId: string, change: unknown): Promise<Correction> {
  const { id } = await propose(agent, pointId, change);
  await agent.post(`/corrections/${id}/application`, {}).expect(202);
  await runJobs(app);
  const { body } = await agent.get(`/corrections/${id}`).expect(200);
  return body as Correction;
}

async function energyOf(agent: Agent, pointId: string) {
  const { body } = await agent
    .get(`/points/${pointId}/energy?from=2026-02-02&to=2026-02-03&step=total`)
    .expect(200);
  const { heating, cooling, coveredS, rows } = body.totals;
  return { heating: heating.energyKwh, cooling: cooling.energyKwh, coveredS, rows };
}

const days = (pointId: string) => loadDays(app.database, pointId, "2026-01-01", "2027-01-01");

test("a nominal bore put right scales the energy by (102.9651/102.26)², its effect known beforehand", async () => {
  const { agent, point } = await measured();
  const before = await energyOf(agent, point.id);
  expect(before.cooling).toBeCloseTo(4 * hourKwh, 1);
  const change = {
    kind: "scaleByBore",
    from: at(0),
    to: null,
    enteredBoreMm: 102.26,
    trueBoreMm: 102.9651,
  };
  const { id } = await propose(agent, point.id, change);
  const { body: proposed } = await agent.get(`/corrections/${id}`).expect(200);
  expect(proposed).toMatchObject({ state: "proposed", can: { apply: true, withdraw: true } });
  expect(proposed.effect.before.coolingKwh).toBeCloseTo(before.cooling, 5);
  // (102.9651 / 102.26)² = 1.0138378
  expect(proposed.effect.after.coolingKwh / before.cooling).toBeCloseTo(1.0138378, 6);
  expect(proposed.effect.rowsChanged).toBe(49);
  // 4 h of 28.8 m³/h, and its ± beside it.
  const { volume } = proposed.effect;
  expect(volume.beforeM3).toBeCloseTo(115.2, 6);
  expect(volume.afterM3 / volume.beforeM3).toBeCloseTo(1.0138378, 6);
  expect(proposed.volumePercent).toBeGreaterThan(0);
  // Known, and not yet done.
  expect(await energyOf(agent, point.id)).toEqual(before);
  await agent.post(`/corrections/${id}/application`, {}).expect(202);
  await runJobs(app);
  expect((await energyOf(agent, point.id)).cooling).toBeCloseTo(before.cooling * 1.0138378, 3);
});

test("withdrawing a correction gives the days back bit for bit, and an earlier result stays readable", async () => {
  const { agent, point } = await measured();
  const before = await days(point.id);
  const { id } = await corrected(agent, point.id, {
    kind: "exclude",
    from: at(60),
    to: at(120),
    rule: null,
  });
  // Rows of 60 to 115 minutes are out: the steps from 55 to 120 minutes go.
  const during = await energyOf(agent, point.id);
  expect(during.coveredS).toBe((240 - 65) * 60);
  expect(during.rows).toMatchObject({ measured: 37, excluded: 12 });
  const { body: summary } = await agent
    .get(`/points/${point.id}/summary?from=2026-02-02&to=2026-02-03`)
    .expect(200);
  expect(summary.leftOut[0]).toMatchObject({ kind: "excluded", reason: "correction", rows: 12 });
  await agent.post(`/corrections/${id}/withdrawal`, { reason: "it was the pump" }).expect(202);
  await runJobs(app);
  expect(await days(point.id)).toEqual(before);

  const { body } = await agent.get(`/points/${point.id}/results`).expect(200);
  const items = body.items as EnergyResult[];
  expect(items.map(({ cause, isCurrent }) => [cause, isCurrent])).toEqual([
    ["withdrawal", true],
    ["correction", false],
    ["import", false],
  ]);
  expect(items[0]?.coolingKwh).toBe(items[2]?.coolingKwh);
  expect(items[1]).toMatchObject({
    corrections: [{ id, kind: "exclude" }],
    files: [{ name: "log.csv", rows: 49 }],
  });
  const earlier = await agent.get(`/results/${items[1]?.id ?? ""}`).expect(200);
  expect(earlier.body.days).toEqual([
    expect.objectContaining({ date: "2026-02-02", coveredS: (240 - 65) * 60 }),
  ]);
  expect(earlier.body.days[0].coolingKwh).toBeCloseTo(during.cooling, 5);
});

test("swapped sides move the energy from one register to the other on every reader's readings", async () => {
  const { agent, point } = await measured();
  await corrected(agent, point.id, { kind: "swapSides", from: at(0), to: at(120) });
  const { heating, cooling } = await energyOf(agent, point.id);
  // Rows before 120 minutes are swapped; the step from 115 to 120 is half of each. Density is taken
  // at the return's 6.90 °C then, 0.05 % more than at 12.80 °C.
  const steps = 23.5;
  expect(heating / ((hourKwh * steps) / 12)).toBeCloseTo(1.0005, 4);
  expect(cooling).toBeCloseTo((hourKwh * (48 - steps)) / 12, 2);
  const { body } = await agent
    .get(`/points/${point.id}/readings?from=${at(0)}&to=${at(5)}`)
    .expect(200);
  expect(body.items[0]).toMatchObject({ supplyC: 12.8, returnC: 6.9 });
  const csv = await agent.get(`/points/${point.id}/readings.csv?from=${at(0)}&to=${at(5)}`);
  expect(csv.text).toContain(";12.8;6.9;".replaceAll(";", ","));
});

test("flow of the wrong sign counts once it is turned", async () => {
  const { agent, point } = await measured();
  await corrected(agent, point.id, { kind: "flipFlow", from: at(0), to: null });
  const { heating, cooling } = await energyOf(agent, point.id);
  expect([heating, cooling]).toEqual([expect.closeTo(4 * hourKwh, 1), 0]);
});

test("an offset of a probe changes every point an installation says it sat on, for that time", async () => {
  const { agent, organisationId, point } = await measured();
  const other = await pointToMeter(app, organisationId);
  const rows = loggedRows({ fromMs: from, count: 49, stepMs: 5 * minute });
  await storedReadings(app, { organisationId, pointId: other.point.id }, rows, 5 * minute);
  const untouched = await pointToMeter(app, organisationId);
  await storedReadings(app, { organisationId, pointId: untouched.point.id }, rows, 5 * minute);
  const made = (serial: string) =>
    Instrument.create({ organisationId, kind: "probe", serial, createdAt: app.clock.date() });
  const [probe, partner] = [await made("4101"), await made("4102")];
  const installed = async (pointId: string, supply: Instrument, back: Instrument) => {
    const on = ({ id }: Instrument) => ({
      probeId: id,
      mounting: "surface",
      depthMm: null,
      insulated: true,
    });
    const probes = { supply: on(supply), return: on(back) };
    const startsAt = new Date(from - 1000).toISOString();
    const { body } = await agent
      .post(`/points/${pointId}/installations`, { startsAt, probes })
      .expect(201);
    return body.id as string;
  };
  await installed(point.id, partner, probe);
  const otherInstallation = await installed(other.point.id, probe, partner);
  const change = {
    kind: "probeOffset",
    probeId: probe.id,
    from: at(0),
    to: null,
    addK: 0.1,
    bathCheckId: null,
  };
  const { id, points } = await propose(agent, point.id, change);
  expect(points.map((touched) => touched.id).sort()).toEqual([point.id, other.point.id].sort());
  await agent.post(`/corrections/${id}/application`, {}).expect(202);
  await runJobs(app);
  // Return 12.90 °C: ρ·Δh rises from 5.9 to 6.0 K, 201.148 kW by hand with cp 4.19 kJ/(kg·K).
  expect((await energyOf(agent, point.id)).cooling / (4 * hourKwh)).toBeCloseTo(6.0 / 5.9, 3);
  expect((await energyOf(agent, other.point.id)).cooling / (4 * hourKwh)).toBeCloseTo(5.8 / 5.9, 3);
  expect((await energyOf(agent, untouched.point.id)).cooling).toBeCloseTo(4 * hourKwh, 1);
  await agent
    .post(`/points/${untouched.point.id}/corrections`, { change, reason: "not here" })
    .expect(422);
  // The probe never sat there after all: its offset goes with the record of it.
  await agent
    .post(`/installations/${otherInstallation}/withdrawal`, { reason: "another visit's" })
    .expect(200);
  await runJobs(app);
  expect((await energyOf(agent, other.point.id)).cooling).toBeCloseTo(4 * hourKwh, 1);
});

test("a slow clock moves the rows to their day, and withdrawn they are back where the log had them", async () => {
  const { agent, point, file } = await measured();
  const before = await days(point.id);
  const { id, state } = await corrected(agent, point.id, {
    kind: "clock",
    logFileId: file.id,
    offsetS: 86_400 * 40 - 7200,
    driftSPerDay: 0,
    referenceAt: at(0),
  });
  expect(state).toBe("applied");
  // Forty days later, two hours before midnight: two hours in each day.
  expect((await days(point.id)).map((day) => [day.date, day.totals.coveredS])).toEqual([
    ["2026-03-13", 7200],
    ["2026-03-14", 7200],
  ]);
  const { body } = await agent
    .get(`/points/${point.id}/summary?from=2026-03-13&to=2026-03-15`)
    .expect(200);
  expect([body.firstReadingAt, body.lastReadingAt]).toEqual([
    "2026-03-13T22:00:00.000Z",
    "2026-03-14T02:00:00.000Z",
  ]);
  await agent.post(`/corrections/${id}/withdrawal`, { reason: "it was right" }).expect(202);
  await runJobs(app);
  expect(await days(point.id)).toEqual(before);
});

test("numbers read in another unit, and no channel the file lacks or unit nobody knows", async () => {
  const { agent, point, file } = await measured();
  const change = { kind: "unit", logFileId: file.id, channel: "flow", unit: "L/s" };
  await corrected(agent, point.id, change);
  expect((await energyOf(agent, point.id)).cooling).toBeCloseTo(4 * hourKwh * 3.6, 0);
  const refused = (wanted: object) =>
    agent.post(`/points/${point.id}/corrections`, {
      change: { ...change, ...wanted },
      reason: "a wrong unit",
    });
  await refused({ unit: "degC" }).expect(422);
  await refused({ logFileId: "999999" }).expect(422);
  // The same channel a second time would be converted twice.
  await refused({ unit: "L/min" }).expect(409);
});

test("glycol for a stretch is worked out as glycol there and as water elsewhere", async () => {
  const { agent, point } = await measured();
  await corrected(agent, point.id, {
    kind: "fluid",
    from: at(120),
    to: null,
    fluid: { kind: "propyleneGlycol", percent: 30, basis: "mass" },
  });
  const { cooling } = await energyOf(agent, point.id);
  // 30 % by mass carries 5.88 % less than water at 12/6 °C (ASHRAE tables); half of the time.
  expect(cooling / (4 * hourKwh)).toBeCloseTo(1 - 0.0588 / 2, 3);
});

test("a proposal is weighed anew once other readings of its point changed", async () => {
  const { agent, organisationId, point } = await measured();
  const change = { kind: "exclude", from: at(0), to: null, rule: null };
  const { id } = await propose(agent, point.id, change);
  const rows = loggedRows({ fromMs: from + 240 * minute, count: 13, stepMs: 5 * minute });
  await storedReadings(app, { organisationId, pointId: point.id }, rows, 5 * minute);
  const waiting = await agent.get(`/corrections/${id}`).expect(200);
  expect(waiting.body).toMatchObject({ state: "working", effect: null });
  const early = await agent.post(`/corrections/${id}/application`, {}).expect(409);
  expect(early.body.code).toBe("correction-being-weighed");
  await runJobs(app);
  const weighed = await agent.get(`/corrections/${id}`).expect(200);
  expect(weighed.body.effect.before.coolingKwh).toBeCloseTo(5 * hourKwh, 1);
  expect(weighed.body.effect.after.coolingKwh).toBe(0);
});

test("weighing that is killed leaves nothing, and taken up again gives the same effect", async () => {
  const { agent, point } = await measured();
  const change = { kind: "exclude", from: at(60), to: at(120), rule: null };
  const { body } = await agent
    .post(`/points/${point.id}/corrections`, { change, reason: "killed" })
    .expect(201);
  const around = (wanted: "go on" | "hand back") => ({
    database: app.database,
    files: app.services.files,
    owner: "test",
    wanted: () => wanted,
    onProgress: () => undefined,
  });
  const job = await claimJob(app.database, "test", app.clock.date());
  if (job === null) throw new Error("the proposal queued no job");
  expect(await runJob(job, around("hand back"))).toEqual({ kind: "handedBack" });
  const { body: still } = await agent.get(`/corrections/${body.id}`).expect(200);
  expect(still).toMatchObject({ state: "working", effect: null });
  // As after a kill: the same job, once more, twice.
  expect(await runJob(job, around("go on"))).toEqual({ kind: "done" });
  const { body: first } = await agent.get(`/corrections/${body.id}`).expect(200);
  expect(first.effect.rowsChanged).toBe(12);
  expect(await runJob(job, around("go on"))).toEqual({ kind: "dropped" });
  const { body: second } = await agent.get(`/corrections/${body.id}`).expect(200);
  expect(second).toEqual(first);
});

test("an import afterwards is worked out with the correction on it", async () => {
  const { agent, organisationId, point } = await measured();
  await corrected(agent, point.id, {
    kind: "scaleByBore",
    from: at(0),
    to: null,
    enteredBoreMm: 100,
    trueBoreMm: 110,
  });
  const rows = loggedRows({ fromMs: from + 240 * minute, count: 13, stepMs: 5 * minute });
  await storedReadings(app, { organisationId, pointId: point.id }, rows, 5 * minute);
  expect((await energyOf(agent, point.id)).cooling).toBeCloseTo(5 * hourKwh * 1.21, 0);
});

test.each([
  [{ kind: "exclude", from: at(60), to: at(60), rule: null }, "empty-range"],
  [
    { kind: "scaleByBore", from: at(0), to: null, enteredBoreMm: 100, trueBoreMm: 100 },
    "no-change",
  ],
  [
    { kind: "probeOffset", probeId: "99999", from: at(0), to: null, addK: 1, bathCheckId: null },
    "no-such-probe",
  ],
  [
    {
      kind: "clock",
      logFileId: "99999",
      offsetS: 1,
      driftSPerDay: 0,
      referenceAt: at(0),
    },
    "not-of-this-point",
  ],
] as [CorrectionChange, string][])("%j is refused: %s", async (change, code) => {
  const { agent, point } = await measured();
  const { body } = await agent
    .post(`/points/${point.id}/corrections`, { change, reason: "wrong" })
    .expect(422);
  expect(body.errors[0].code).toBe(code);
});

test("what was proposed, applied and withdrawn is in the audit trail with its reason", async () => {
  const { agent, organisationId, point } = await measured("surveyor");
  const { id } = await corrected(agent, point.id, { kind: "flipFlow", from: at(0), to: null });
  await agent.post(`/corrections/${id}/withdrawal`, { reason: "arrow was right" }).expect(202);
  const events = await app.database.query<{ kind: string; details: unknown }>(
    "SELECT kind, details FROM audit_event WHERE organisation_id = :organisationId AND subject_id = :id AND subject_kind = 'correction' ORDER BY id",
    { replacements: { organisationId, id }, type: QueryTypes.SELECT },
  );
  expect(events.map(({ kind }) => kind)).toEqual([
    "correction-proposed",
    "correction-applied",
    "correction-withdrawn",
  ]);
  expect(JSON.stringify(events[2]?.details)).toContain("arrow was right");
});
