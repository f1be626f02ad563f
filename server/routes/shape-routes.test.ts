import { readFileSync } from "node:fs";
import path from "node:path";
import type { ImportDetail } from "@shared/contracts/imports";
import type { PointShape } from "@shared/contracts/shape";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { HOUR_MS, MINUTE_MS } from "@shared/domain/time/interval";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { loggedRows, storedReadings } from "@server/testing/reading-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();

const scenario = path.join(process.cwd(), "test/fixtures/scenarios/S07");
const text = (name: string) => readFileSync(path.join(scenario, name), "utf8");
const pump = {
  controlledHead: true,
  staticHeadM: 8,
  designHeadM: 26,
  designFlowM3PerHour: 130,
  efficiency: 0.58,
  minimumFlowM3PerHour: 20,
  pricePerKwh: "0.187",
};

/** Brings a file in as a person would: upload, say that its rows are means from their label, store. */
async function importMeans(agent: Agent, pointId: string, content: string): Promise<void> {
  const { id } = (await agent.post(`/points/${pointId}/imports`).expect(201)).body as ImportDetail;
  await agent.post(`/imports/${id}/files`).attach("file", Buffer.from(content), "week.csv");
  await runJobs(app);
  const [file] = ((await agent.get(`/imports/${id}`).expect(200)).body as ImportDetail).files;
  const recipe: FileRecipe = { ...(file?.recipe as FileRecipe), seriesKind: "meanFromLabel" };
  await agent.put(`/imports/${id}/files/${file?.id}/recipe`, recipe).expect(200);
  await runJobs(app);
  await agent.post(`/imports/${id}/confirm`).expect(202);
  await runJobs(app);
  const done = (await agent.get(`/imports/${id}`).expect(200)).body as ImportDetail;
  expect(done).toMatchObject({ state: "imported", rowsStored: 168 });
}

const shapeOf = async (agent: Agent, pointId: string, query: string): Promise<PointShape> =>
  (await agent.get(`/points/${pointId}/shape?${query}`).expect(200)).body;

describe("two weeks of hourly means, from the file to the figures", () => {
  // Recomputed from the readings alone by a second program; 0.05 %, percentiles 0.5 %.
  const expected = JSON.parse(text("expected.json")) as Record<string, Record<string, number>>;

  it.each([
    ["week_A", "2025-06-02", "2025-06-09"],
    ["week_B", "2025-06-09", "2025-06-16"],
  ])("%s has every figure of the second program", async (week, from, to) => {
    const agent = await signedIn(app);
    const { point, loop } = await pointToMeter(app, agent.organisationId, { meterSide: "return" });
    await agent.patch(`/loops/${loop.id}`, { designDeltaTK: 6 }).expect(200);
    await agent.put(`/loops/${loop.id}/pump`, pump).expect(200);
    await importMeans(agent, point.id, text(`${week}.csv`));
    const shape = await shapeOf(agent, point.id, `from=${from}&to=${to}&windowMinutes=60`);
    const figures: Record<string, number | null | undefined> = {
      energy_kWh: shape.energyKwh,
      volume_m3: shape.volumeM3,
      flow_weighted_dT_K: shape.deltaT.flowWeightedK,
      energy_weighted_dT_K: shape.deltaT.energyWeightedK,
      simple_mean_dT_K: shape.deltaT.timeMeanK,
      L_s_per_kW: shape.specificFlow?.litresPerSecondPerKw,
      gpm_per_ton: shape.specificFlow?.gpmPerTon,
      ideal_volume_m3: shape.excess?.idealVolumeM3,
      excess_volume_pct: (shape.excess?.excessShare ?? NaN) * 100,
      pump_kWh: shape.pumping?.energyKwh,
      pump_at_ideal_kWh: shape.pumping?.idealEnergyKwh,
      pump_excess_kWh: shape.pumping?.excessKwh,
      pump_excess_cost: shape.pumping?.excessCost,
      peak_kW: shape.peaks.fixed?.powerKw,
      load_factor: shape.peaks.fixed?.loadFactor,
      EFLH_h: shape.peaks.fixed?.fullLoadHours,
      off_hours_energy_share_pct: (shape.offHours.energyShare ?? NaN) * 100,
      base_load_p5_kW: shape.baseLoad?.powerKw,
      hours_dT_below_4K: (shape.lowDeltaT?.seconds ?? NaN) / 3600,
    };
    // Nothing the second program gives is left unread.
    expect(Object.keys(figures).sort()).toEqual(Object.keys(expected[week] ?? {}).sort());
    for (const [key, own] of Object.entries(figures)) {
      const error = Math.abs((own ?? NaN) / (expected[week]?.[key] ?? NaN) - 1);
      const tolerance = key === "base_load_p5_kW" ? 5e-3 : 5e-4;
      expect([key, own, error < tolerance]).toEqual([key, own, true]);
    }
    expect(shape).toMatchObject({
      register: "cooling",
      stepMinutes: 60,
      occupiedHours: { weekdays: [1, 2, 3, 4, 5], start: "07:00", end: "19:00", assumed: true },
      pumping: { cubeLawHolds: false, pricePerKwh: "0.187", currency: "EUR" },
    });
    // The mean weighted by flow is the one that E ÷ (k·V) gives back.
    expect(shape.deltaT.fromEnergyK! / shape.deltaT.flowWeightedK!).toBeCloseTo(1, 3);
    expect(shape.deltaT.fromEnergyK! / shape.deltaT.timeMeanK!).not.toBeCloseTo(1, 2);
    expect(shape.curve[0]).toEqual({ hours: 0, powerKw: shape.peaks.fixed?.powerKw });
    expect(shape.curve.at(-1)?.hours).toBe(168);
    // An hourly log has no quarter-hour peak.
    const quarter = await shapeOf(agent, point.id, `from=${from}&to=${to}&windowMinutes=15`);
    expect(quarter.peaks).toEqual({ fixed: null, rolling: null });
  });
});

/** A steady load with one busy hour from 10:15, by the minute; 10 January 2026 is a Saturday. */
async function minuteLog(wishes: Parameters<typeof pointToMeter>[2] = {}) {
  const agent = await signedIn(app);
  const { site, loop, point } = await pointToMeter(app, agent.organisationId, {
    meterSide: "return",
    ...wishes,
  });
  const owner = { organisationId: agent.organisationId, pointId: point.id };
  const rows = loggedRows({
    fromMs: Date.UTC(2026, 0, 9),
    count: 48 * 60 + 1,
    stepMs: MINUTE_MS,
    flow: (row) => (row >= 615 && row < 675 ? 57.6 : row < 60 ? 0 : 28.8),
  });
  await storedReadings(app, owner, rows, MINUTE_MS, "meanFromLabel");
  return { agent, site, loop, point };
}

const days = "from=2026-01-09&to=2026-01-11";
// 28.8 m³/h at 6.90 → 12.80 °C with the meter on the return cools 197.798 kW.
const steadyKw = 197.798;

describe("getPointShape", () => {
  it("tells the rolling peak from the fixed one, each with its load factor", async () => {
    const { agent, point } = await minuteLog();
    const shape = await shapeOf(agent, point.id, days);
    expect(shape.stepMinutes).toBe(15);
    expect(shape.peaks.rolling).toMatchObject({ from: "2026-01-09T10:15:00.000Z" });
    expect(shape.peaks.rolling?.powerKw).toBeCloseTo(2 * steadyKw, 1);
    expect(shape.peaks.fixed).toMatchObject({ from: "2026-01-09T10:00:00.000Z" });
    expect(shape.peaks.fixed?.powerKw).toBeCloseTo(1.75 * steadyKw, 1);
    expect(shape.peaks.rolling?.loadFactor).toBeCloseTo(0.5, 4);
    expect(shape.curve.length).toBeLessThanOrEqual(200);
  });

  it("takes occupied hours from the site, and the base load from the hours asked for", async () => {
    const { agent, site, point } = await minuteLog();
    const hours = { weekdays: [6], start: "00:00", end: "24:00" };
    const changed = await agent.patch(`/sites/${site.id}`, { occupiedHours: hours }).expect(200);
    expect(changed.body.occupiedHours).toEqual({ ...hours, assumed: false });
    const shape = await shapeOf(agent, point.id, `${days}&hours=unoccupied`);
    // Of 48 h of energy as one hour at rest, one at double: Friday and Saturday have 24 h each.
    expect(shape.offHours.energyShare).toBeCloseTo(0.5, 3);
    expect(shape.offHours.dayOffRatio).toBeCloseTo(1, 3);
    expect(shape.baseLoad).toMatchObject({ hours: "unoccupied", steps: 96 });
    const back = await agent.patch(`/sites/${site.id}`, { occupiedHours: null }).expect(200);
    expect(back.body.occupiedHours.assumed).toBe(true);
  });

  it.each([
    [{ weekdays: [1], start: "19:00", end: "07:00" }],
    [{ weekdays: [1], start: "07:10", end: "19:00" }],
    [{ weekdays: [1, 1], start: "07:00", end: "19:00" }],
    [{ weekdays: [], start: "07:00", end: "19:00" }],
  ])("refuses hours that are none: %j", async (occupiedHours) => {
    const agent = await signedIn(app);
    const { site } = await pointToMeter(app, agent.organisationId);
    await agent.patch(`/sites/${site.id}`, { occupiedHours }).expect(422);
  });

  it("leaves unknown what nobody has given: design, pump, price", async () => {
    const { agent, loop, point } = await minuteLog();
    const bare = await shapeOf(agent, point.id, days);
    expect(bare).toMatchObject({ design: null, excess: null, pumping: null, lowDeltaT: null });
    await agent.patch(`/loops/${loop.id}`, { designDeltaTK: 5.9, designFlowM3PerHour: 57.6 });
    const free = { ...pump, controlledHead: false, staticHeadM: null, pricePerKwh: null };
    await agent.put(`/loops/${loop.id}/pump`, free).expect(200);
    const known = await shapeOf(agent, point.id, `${days}&qMin=0`);
    expect(known.design?.powerKw).toBeCloseTo(2 * steadyKw, 1);
    expect(known.excess?.excessShare).toBeCloseTo(0, 5);
    expect(known.pumping).toMatchObject({ cubeLawHolds: true, excessCost: null });
  });

  it("has nothing to say of days without readings", async () => {
    const { agent, point } = await minuteLog();
    const none = await shapeOf(agent, point.id, "from=2026-03-01&to=2026-03-02");
    expect(none).toMatchObject({
      energyKwh: null,
      meanKw: null,
      peaks: { fixed: null, rolling: null },
      curve: [],
      baseLoad: null,
      pumpWithoutDeltaT: null,
      offHours: { energyShare: null, energyKwh: null },
    });
  });

  it("lists when the pump ran for nothing", async () => {
    const agent = await signedIn(app);
    const { point } = await pointToMeter(app, agent.organisationId);
    const owner = { organisationId: agent.organisationId, pointId: point.id };
    const rows = loggedRows({
      fromMs: Date.UTC(2026, 0, 9),
      count: 24 * 60,
      stepMs: MINUTE_MS,
      return: (row) => (row >= 120 && row < 210 ? 7.2 : 12.8),
    });
    await storedReadings(app, owner, rows, MINUTE_MS, "meanFromLabel");
    const shape = await shapeOf(agent, point.id, "from=2026-01-09&to=2026-01-10");
    expect(shape.pumpWithoutDeltaT).toEqual({
      limitK: 1,
      seconds: (1.5 * HOUR_MS) / 1000,
      runs: [{ from: "2026-01-09T02:00:00.000Z", to: "2026-01-09T03:30:00.000Z" }],
      runCount: 1,
    });
  });

  it.each([
    ["from=2026-01-09T00:07:00Z&to=2026-01-10T00:00:00Z", "not-a-quarter-hour"],
    ["from=2020-01-01&to=2026-01-01", "range-too-long"],
  ])("refuses %s", async (query, code) => {
    const agent = await signedIn(app);
    const { point } = await pointToMeter(app, agent.organisationId);
    const answer = await agent.get(`/points/${point.id}/shape?${query}`).expect(422);
    expect(answer.body.errors[0].code).toBe(code);
  });
});

it("writes the whole duration curve as CSV, from most power to least", async () => {
  const { agent, point } = await minuteLog();
  const answer = await agent.get(`/points/${point.id}/duration.csv?${days}`).expect(200);
  const lines = answer.text.replace("\uFEFF", "").trim().split("\r\n");
  expect(lines[0]).toBe("Loop,Point,Hours at or above (h),Cooling power (kW)");
  // 192 quarter-hours and the point at 0 h.
  expect(lines).toHaveLength(1 + 1 + 192);
  expect(Number(lines[1]?.split(",")[3])).toBeCloseTo(2 * steadyKw, 1);
  expect(lines.at(-1)?.split(",").slice(2)).toEqual(["48", "0"]);
});

describe("a loop's pump", () => {
  it("is set, read back with its price as written, changed and forgotten", async () => {
    const agent = await signedIn(app);
    const { loop } = await pointToMeter(app, agent.organisationId);
    const address = `/loops/${loop.id}/pump`;
    expect((await agent.get(address).expect(200)).body).toEqual({
      pump: null,
      currency: "EUR",
      can: { edit: true },
    });
    expect((await agent.put(address, pump).expect(200)).body.pump).toEqual(pump);
    await agent.put(address, { ...pump, pricePerKwh: "100" }).expect(200);
    expect((await agent.get(address)).body.pump.pricePerKwh).toBe("100");
    await agent.delete(address).expect(200);
    expect((await agent.get(address)).body.pump).toBeNull();
    const surveyor = await signedIn(app, {
      role: "surveyor",
      organisationId: agent.organisationId,
    });
    expect((await surveyor.get(address).expect(200)).body.can.edit).toBe(false);
    await surveyor.put(address, pump).expect(403);
  });

  it.each([
    [{ efficiency: null }, "efficiency", "incomplete-curve"],
    [{ staticHeadM: null }, "staticHeadM", "needs-static-head"],
    [{ controlledHead: false }, "staticHeadM", "no-static-head"],
    [{ staticHeadM: 27 }, "staticHeadM", "above-design-head"],
  ])("refuses %j", async (change, field, code) => {
    const agent = await signedIn(app);
    const { loop } = await pointToMeter(app, agent.organisationId);
    const answer = await agent.put(`/loops/${loop.id}/pump`, { ...pump, ...change }).expect(422);
    expect(answer.body.errors).toEqual([
      expect.objectContaining({ pointer: `/body/${field}`, code }),
    ]);
  });

  it("goes with its loop", async () => {
    const agent = await signedIn(app);
    const { loop } = await pointToMeter(app, agent.organisationId);
    await agent.put(`/loops/${loop.id}/pump`, pump).expect(200);
    await agent.delete(`/loops/${loop.id}`).expect(200);
    await agent.get(`/loops/${loop.id}/pump`).expect(404);
  });
});
