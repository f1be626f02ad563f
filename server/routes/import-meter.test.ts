import { readFileSync } from "node:fs";
import path from "node:path";
import type { EnergyAnswer, PointSummary } from "@shared/contracts/energy";
import type { ImportDetail } from "@shared/contracts/imports";
import { loadIntervals } from "@server/readings/interval-rows";
import { signedIn, type Agent } from "@server/testing/factories";
import { importSteps } from "@server/testing/import-steps";
import { pointToMeter } from "@server/testing/place-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();
const { uploaded, answered, stored } = importSteps(app);
// The files are of spring 2026: none of their rows may lie ahead of the day they come in.
beforeAll(() => app.clock.advance({ days: 60 }));

const fixtures = path.join(__dirname, "../../test/fixtures/scenarios/S06");
const expected = JSON.parse(readFileSync(path.join(fixtures, "expected.json"), "utf8")) as Record<
  "autumn_2025_10_26" | "spring_2026_03_29",
  { intervals: number; energy_kWh: number; peak30_fixed_kW: number }
> & { naive_error_kWh: number };

const quarter = 900_000;

const codes = (detail: ImportDetail) => detail.files[0]?.questions.map(({ code }) => code);

/** What the loop page shows of the point over [from, to). */
async function summaryOf(agent: Agent, pointId: string, from: string, to: string) {
  const answer = await agent.get(`/points/${pointId}/summary?from=${from}&to=${to}`).expect(200);
  return answer.body as PointSummary;
}

describe.each([
  ["autumn", "autumn.csv", "autumn_2025_10_26", "2025-10-26", "2025-10-27"],
  ["spring", "spring.csv", "spring_2026_03_29", "2026-03-29", "2026-03-30"],
] as const)("the %s day on which clocks change, S06", (_name, fileName, key, from, to) => {
  test("a meter's interval means come to every quarter-hour and the day's whole energy", async () => {
    const agent = await signedIn(app, { role: "surveyor" });
    const { point } = await pointToMeter(app, agent.organisationId, {
      zone: "Europe/Paris",
      service: "hot",
    });
    const text = readFileSync(path.join(fixtures, fileName), "utf8");
    const asking = await uploaded(agent, point.id, text);
    // Nothing in the file tells of which step the means are, or the clock: both are asked.
    expect(codes(asking)).toEqual(expect.arrayContaining(["seriesKind", "loggerClock"]));
    expect(asking.files[0]?.recipe?.columns[1]).toMatchObject({ meaning: "power", unit: "kW" });
    const ready = await answered(agent, asking, (recipe) => ({
      ...recipe,
      seriesKind: "meanFromLabel",
      time: { ...recipe.time, clock: { kind: "site" } },
    }));
    expect(ready.state).toBe("ready");
    const wanted = expected[key];
    expect(ready.checks?.energy?.heatingKwh).toBeCloseTo(wanted.energy_kWh, 3);
    expect(ready.checks?.energy).toMatchObject({ coolingKwh: 0, volumeM3: null });
    await stored(agent, ready);

    const summary = await summaryOf(agent, point.id, from, to);
    const { totals, basis, busiest } = summary;
    expect(Math.abs((totals.heating.energyKwh ?? 0) / wanted.energy_kWh - 1)).toBeLessThan(1e-4);
    expect(totals).toMatchObject({ coveredS: wanted.intervals * 900, volumeM3: null });
    expect(totals.heating).toMatchObject({ volumeM3: null, flowWeightedDeltaTK: null });
    expect(basis).toMatchObject({ blockedBy: null, meansOnly: false, rowsAgainstRegister: 0 });
    expect(busiest?.powerKw).toBeCloseTo(wanted.peak30_fixed_kW, 3);
    expect(busiest).toMatchObject({ supplyC: null, flowM3PerHour: null, register: "heating" });
    const energy = await agent
      .get(`/points/${point.id}/energy?from=${from}&to=${to}&step=quarterHour`)
      .expect(200);
    const { columns } = energy.body as EnergyAnswer;
    expect(columns?.startMs).toHaveLength(wanted.intervals);
    expect(columns?.coveredS.every((s) => s === 900)).toBe(true);
    expect(columns?.volumeM3.every((volume) => volume === null)).toBe(true);
  });
});

test("dropping the repeated labels of the autumn day would lose 165.225 kWh", () => {
  const rows = readFileSync(path.join(fixtures, "autumn.csv"), "utf8").trim().split("\n").slice(1);
  const seen = new Set<string>();
  let lost = 0;
  for (const row of rows) {
    const [label = "", power = ""] = row.trim().split(";");
    if (seen.has(label)) lost += Number(power.replace(",", ".")) / 4;
    seen.add(label);
  }
  expect(lost).toBeCloseTo(-expected.naive_error_kWh, 3);
});

/** Quarter-hours from 2025-05-18 00:00 UTC with the cells of each row. */
function quarterHours(header: string, rows: readonly (readonly (number | string)[])[]): string {
  const lines = rows.map((cells, i) =>
    [new Date(Date.UTC(2025, 4, 18) + i * quarter).toISOString(), ...cells].join(";"),
  );
  return [`Time (UTC);${header}`, ...lines, ""].join("\n");
}

async function heatingKwh(pointId: string): Promise<number[]> {
  const from = Date.UTC(2025, 4, 18) - 900_000;
  const energy = await loadIntervals(app.database, pointId, from, from + 86_400_000);
  return [...energy.heating.energyKwh];
}

describe("an energy counter", () => {
  const counts = [9998.2, 9999.6, 0.9, 2.9, 2.1, 4.1, 6.1, 8.1].map((mwh) => [mwh]);

  test("rolls over at its capacity, and a fall that cannot be a rollover leaves a hole", async () => {
    const agent = await signedIn(app, { role: "engineer" });
    // 2 × 1000 m³/h over 2 × 40 K cannot pass 187 MW: 1.3 MWh in a quarter of an hour is possible.
    const { point } = await pointToMeter(app, agent.organisationId, {
      service: "hot",
      designFlowM3PerHour: 1000,
      designDeltaTK: 40,
    });
    const detail = await uploaded(agent, point.id, quarterHours("Heat energy [MWh]", counts));
    expect(detail.files[0]?.recipe?.columns[1]).toMatchObject({
      meaning: "heatingCounter",
      unit: "MWh",
    });
    // Without a capacity no fall is believed.
    const steps = (of: ImportDetail) =>
      Object.fromEntries(of.checks?.files[0]?.steps.map(({ code, count }) => [code, count]) ?? []);
    expect(steps(detail)).toMatchObject({ counterReset: 2 });
    expect(detail.checks?.energy?.heatingKwh).toBeCloseTo(1400 + 2000 + 3 * 2000, 6);
    const ready = await answered(agent, detail, (recipe) => ({
      ...recipe,
      columns: recipe.columns.map((column) =>
        column.meaning === "heatingCounter" ? { ...column, capacity: 9999.9 } : column,
      ),
    }));
    expect(steps(ready)).toMatchObject({ counterRollover: 1, counterReset: 1 });
    expect(ready.checks?.files[0]?.steps.find(({ code }) => code === "counterReset")).toMatchObject(
      {
        examples: [{ line: 6, cell: "2.9 → 2.1" }],
      },
    );
    expect(ready.checks?.rows).toMatchObject({ measured: 7, noReading: 1 });
    await stored(agent, ready);
    const wanted = [1400, 1300, 2000, 0, 2000];
    (await heatingKwh(point.id))
      .slice(0, 5)
      .forEach((kwh, i) => expect(kwh).toBeCloseTo(wanted[i]!, 6));
    const { totals, leftOut } = await summaryOf(agent, point.id, "2025-05-18", "2025-05-19");
    expect(totals.coveredS).toBe(6 * 900);
    expect(totals).toMatchObject({ volumeM3: null });
    expect(leftOut).toEqual(
      expect.arrayContaining([expect.objectContaining({ kind: "noReading", rows: 1 })]),
    );
  });

  test("loses the step in which somebody says the meter was exchanged", async () => {
    const agent = await signedIn(app, { role: "engineer" });
    const { point } = await pointToMeter(app, agent.organisationId, { service: "hot" });
    const rising = [10, 20, 30, 40].map((kwh) => [kwh]);
    const detail = await uploaded(agent, point.id, quarterHours("Heat energy [kWh]", rising));
    expect(detail.checks?.energy?.heatingKwh).toBeCloseTo(30, 9);
    const ready = await answered(agent, detail, (recipe) => ({
      ...recipe,
      meter: { positivePower: null, exchangedAt: ["2025-05-18T00:20:00.000Z"] },
    }));
    expect(ready.checks?.energy?.heatingKwh).toBeCloseTo(20, 9);
    expect(ready.checks?.files[0]?.steps).toEqual(
      expect.arrayContaining([expect.objectContaining({ code: "counterExchange", count: 1 })]),
    );
  });

  test("runs on from one day's file into the next", async () => {
    const agent = await signedIn(app, { role: "engineer" });
    const { point } = await pointToMeter(app, agent.organisationId, { service: "hot" });
    const text = quarterHours(
      "Heat energy [kWh]",
      [10, 20, 30, 40, 50, 60].map((kwh) => [kwh]),
    );
    const lines = text.trim().split("\n");
    await stored(agent, await uploaded(agent, point.id, `${lines.slice(0, 4).join("\n")}\n`));
    await stored(
      agent,
      await uploaded(agent, point.id, `${[lines[0], ...lines.slice(4)].join("\n")}\n`),
    );
    const { totals } = await summaryOf(agent, point.id, "2025-05-18", "2025-05-19");
    expect(totals.heating.energyKwh).toBeCloseTo(50, 6);
  });

  test("beside a second one fills both registers of a step, and nothing is netted", async () => {
    const agent = await signedIn(app, { role: "engineer" });
    const { point } = await pointToMeter(app, agent.organisationId, { service: "changeover" });
    const rows = [
      [100, 50],
      [103, 51],
      [103, 55],
    ];
    const text = quarterHours("Heating energy [kWh];Cooling energy [kWh]", rows);
    await stored(agent, await uploaded(agent, point.id, text));
    const { totals } = await summaryOf(agent, point.id, "2025-05-18", "2025-05-19");
    expect(totals.heating.energyKwh).toBeCloseTo(3, 9);
    expect(totals.cooling.energyKwh).toBeCloseTo(5, 9);
  });
});

test("a volume counter with temperatures gives the energy of its mean flow and the means of both ends", async () => {
  const agent = await signedIn(app, { role: "engineer" });
  const { point } = await pointToMeter(app, agent.organisationId, { service: "chilled" });
  // 7.2 m³ in a quarter of an hour are 28.8 m³/h: the trade's 197.798 kW at 6.90 → 12.80 °C.
  const rows = [0, 7.2, 14.4, 21.6].map((m3, i) => [m3, i % 2 ? 7.0 : 6.8, i % 2 ? 12.9 : 12.7]);
  const text = quarterHours("Volume total [m³];Supply [°C];Return [°C]", rows);
  const detail = await uploaded(agent, point.id, text);
  expect(detail.files[0]?.recipe?.columns[1]).toMatchObject({
    meaning: "volumeCounter",
    unit: "m3",
  });
  expect(detail.checks?.energy?.coolingKwh).toBeCloseTo((3 * 197.798) / 4, 2);
  expect(detail.checks?.energy?.volumeM3).toBeCloseTo(21.6, 9);
  await stored(agent, detail);
  const { basis, totals } = await summaryOf(agent, point.id, "2025-05-18", "2025-05-19");
  expect(basis).toMatchObject({ blockedBy: null, meansOnly: true });
  expect(totals.volumeM3).toBeCloseTo(21.6, 6);
  expect(totals.cooling.flowWeightedDeltaTK).toBeCloseTo(5.9, 6);
});

describe("a meter's power", () => {
  const power = [[40], [-2], [40], [40]];

  test("of the other sign counts in neither register, and its rows are counted", async () => {
    const agent = await signedIn(app, { role: "engineer" });
    const { point } = await pointToMeter(app, agent.organisationId, { service: "chilled" });
    const detail = await uploaded(agent, point.id, quarterHours("Cooling power [kW]", power));
    expect(detail.checks).toMatchObject({ rowsAgainstRegister: 1, energy: { heatingKwh: 0 } });
    await stored(agent, detail);
    const { basis, totals } = await summaryOf(agent, point.id, "2025-05-18", "2025-05-19");
    expect(basis.rowsAgainstRegister).toBe(1);
    expect(totals.heating.energyKwh).toBe(0);
    // Trapezoids with 0 at the row that counts nowhere: 5 + 5 + 10 kWh.
    expect(totals.cooling.energyKwh).toBeCloseTo(20, 9);
  });

  test("in a changeover loop asks which heat is positive, and stores nothing before", async () => {
    const agent = await signedIn(app, { role: "engineer" });
    const { point } = await pointToMeter(app, agent.organisationId, { service: "changeover" });
    const detail = await uploaded(agent, point.id, quarterHours("Heat power [kW]", power));
    expect(codes(detail)).toEqual(["positivePower"]);
    await agent.post(`/imports/${detail.id}/confirm`).expect(409);
    const ready = await answered(agent, detail, (recipe) => ({
      ...recipe,
      meter: { positivePower: "cooling", exchangedAt: [] },
    }));
    expect(codes(ready)).toEqual([]);
    expect(ready.checks?.energy?.coolingKwh).toBeCloseTo(20, 9);
    expect(ready.checks?.energy?.heatingKwh).toBeCloseTo(0.5, 9);
  });

  test("with temperatures in a changeover loop goes where the water says", async () => {
    const agent = await signedIn(app, { role: "engineer" });
    const { point } = await pointToMeter(app, agent.organisationId, { service: "changeover" });
    const rows = [
      [40, 45, 40],
      [40, 45, 40],
      [20, 7, 12],
      [20, 7, 12],
    ];
    const text = quarterHours("Power [kW];Supply [°C];Return [°C]", rows);
    const detail = await uploaded(agent, point.id, text);
    expect(codes(detail)).toEqual([]);
    expect(detail.checks?.energy).toMatchObject({ heatingKwh: 15, coolingKwh: 7.5 });
  });

  test("in MBH and tons is the same heat as in kW", async () => {
    const agent = await signedIn(app, { role: "engineer" });
    // NIST SP 811, appendix B.8: Btu(IT) 1055.056 J, ton of refrigeration 3516.853 W.
    for (const [unit, kw] of [
      ["MBH", 0.2930711],
      ["ton", 3.516853],
      ["MW", 1000],
      ["W", 0.001],
    ] as const) {
      const { point } = await pointToMeter(app, agent.organisationId, { service: "hot" });
      const text = quarterHours(`Heat power [${unit}]`, [[12], [12], [12], [12], [12]]);
      const detail = await uploaded(agent, point.id, text);
      expect((detail.checks?.energy?.heatingKwh ?? 0) / (12 * kw)).toBeCloseTo(1, 6);
    }
  });
});

test("the billing rule makes a hole of a step that the survey rule bridges, and back", async () => {
  const agent = await signedIn(app, { role: "engineer" });
  const { point } = await pointToMeter(app, agent.organisationId, { service: "hot" });
  const rows = Array.from({ length: 9 }, () => [40]);
  const lines = quarterHours("Heat power [kW]", rows).split("\n");
  lines.splice(5, 1);
  await stored(agent, await uploaded(agent, point.id, lines.join("\n")));
  const energyKwh = async () =>
    (await summaryOf(agent, point.id, "2025-05-18", "2025-05-19")).totals.heating.energyKwh;
  expect(await energyKwh()).toBeCloseTo(80, 9);
  await agent.patch(`/points/${point.id}`).send({ gapRule: "billing" }).expect(200);
  await runJobs(app);
  expect(await energyKwh()).toBeCloseTo(60, 9);
  const { leftOut } = await summaryOf(agent, point.id, "2025-05-18", "2025-05-19");
  const hole = ["2025-05-18T00:45:00.000Z", "2025-05-18T01:15:00.000Z"];
  expect(leftOut.map(({ from, to }) => [from, to])).toContainEqual(hole);
  const kept = await agent.patch(`/points/${point.id}`).send({ name: "Meter room" }).expect(200);
  expect(kept.body).toMatchObject({ gapRule: "billing" });
  await agent.patch(`/points/${point.id}`).send({ gapRule: "survey" }).expect(200);
  await runJobs(app);
  expect(await energyKwh()).toBeCloseTo(80, 9);
});
