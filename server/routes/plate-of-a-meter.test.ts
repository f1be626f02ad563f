import type { PointSummary } from "@shared/contracts/energy";
import type { Installation, WorkedOutInstallation } from "@shared/contracts/evidence";
import type { Workings } from "@shared/contracts/workings";
import { Installation as InstallationRow } from "@server/models/installation";
import { signedIn } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { loggedRows, storedReadings } from "@server/testing/reading-factories";
import { testApp } from "@server/testing/test-app";

const app = testApp();

const DAY = "2026-02-10";
const NEXT = "2026-02-11";
const day = `from=${DAY}&to=${NEXT}`;
const startMs = Date.parse(`${DAY}T00:00:00Z`);
const quarterHour = 900_000;

/** A hot loop whose permanent meter logs its power every quarter-hour: 150 kW for a day, 3600 kWh. */
async function meteredDay({ powerKw = 150, waterRows = 0 } = {}) {
  const agent = await signedIn(app, { role: "engineer" });
  const { point, loop } = await pointToMeter(app, agent.organisationId, { service: "hot" });
  const rows = loggedRows({
    fromMs: startMs,
    count: 96,
    stepMs: quarterHour,
    flow: (row) => (row < waterRows ? 28.8 : NaN),
    supply: (row) => (row < waterRows ? 50 : NaN),
    return: (row) => (row < waterRows ? 45 : NaN),
  });
  const values = Float64Array.from(rows.instantMs, (_, row) => (row < waterRows ? NaN : powerKw));
  await storedReadings(
    app,
    { organisationId: agent.organisationId, pointId: point.id },
    { ...rows, power: { unit: "kW", values } },
    quarterHour,
    "meanFromLabel",
  );
  const summary = async (): Promise<PointSummary> =>
    (await agent.get(`/points/${point.id}/summary?${day}`).expect(200)).body;
  const workings = async (figure: string): Promise<Workings> =>
    (await agent.get(`/points/${point.id}/workings?figure=${figure}&${day}`).expect(200)).body;
  const install = async (fields: object): Promise<Installation> =>
    (
      await agent
        .post(`/points/${point.id}/installations`, { startsAt: "2026-02-01T00:00:00Z", ...fields })
        .expect(201)
    ).body;
  return { agent, point, loop, summary, workings, install };
}

describe("energy that a permanent meter gave", () => {
  it("has no ± and names what is missing while nobody recorded the meter's class", async () => {
    const { summary, workings, install } = await meteredDay();
    const before = await summary();
    expect(before.totals.heating.energyKwh).toBeCloseTo(3600, 6);
    expect(before.plusMinus).toMatchObject({ heating: { energy: null }, lacks: "meterClass" });
    expect((await workings("energy")).cautions).toContain("noUncertaintyForMeter");
    // An installation without the plate changes nothing of that.
    await install({});
    expect((await summary()).plusMinus.lacks).toBe("meterClass");
  });

  // E_f = 2 + 0.02·10 = 2.2, E_t = 0.5 + 3 = 3.5, E_c = 0.5 + 1 = 1.5 (EN 1434-1, from memory, at
  // q_p/10 and Δθ_min): 7.2 %, U = 2·7.2/√3 = 8.313844 % of 3600 kWh = 299.2984 kWh.
  it("carries the limits of the class, which a day of readings does not shrink", async () => {
    const { summary, workings, install } = await meteredDay();
    await install({ meterPlate: { accuracyClass: 2 } });
    const { plusMinus, days, evidence } = await summary();
    expect(evidence?.installations).toMatchObject([{ meterClass: 2, flowMeter: null }]);
    expect(plusMinus.lacks).toBeNull();
    expect(plusMinus.heating.energy).toMatchObject({ expanded: 299.298, basis: "partlyDefaults" });
    expect(plusMinus.volume).toBeNull();
    expect(days[0]?.plusMinus.heating?.expanded).toBe(299.298);
    const shown = await workings("energy");
    expect(shown.plusMinus).toEqual(plusMinus.heating.energy);
    expect(shown.budget?.terms.map(({ term }) => term)).toMatchObject([
      {
        kind: "meterLimits",
        unit: "%",
        distribution: "rectangular",
        origin: {
          code: "meterClassLeastState",
          values: { meterClass: 2, flowPercent: 2.2, pairPercent: 3.5, calculatorPercent: 1.5 },
        },
      },
    ]);
    expect(shown.cautions).toContain("billingHeldUp");
    for (const foreign of [
      "noUncertaintyForMeter",
      "boreUnknown",
      "pressureAssumed",
      "stopVerdict",
    ])
      expect(shown.cautions).not.toContain(foreign);
    expect(shown.formulasFrom.map(({ name }) => name)).toContain("EN 1434-1");
    // Its limits hold flow and temperatures: nobody is told to compare probes it never showed.
    const checks = shown.installations[0]?.verdicts.map(({ check }) => check);
    expect(checks).toContain("completeness");
    expect(checks).not.toContain("bathCheck");
    const power = await workings("power");
    expect(power.plusMinus?.percent).toBeCloseTo(8.313844, 4);
  });

  // Δθ ≥ 150/(1.175·10) = 12.765957 K: 2.2 + 1.205 + 0.735 = 4.14 %, U = 4.780460 %.
  it("is known better where power and the permanent flow bound ΔT", async () => {
    const { summary, install } = await meteredDay();
    await install({
      meterPlate: { accuracyClass: 2, permanentFlowM3PerHour: 10, minimumDeltaTK: 3 },
    });
    expect((await summary()).plusMinus.heating.energy?.percent).toBeCloseTo(4.78046, 4);
  });

  it("has the ± of the meter's own certificate where there is one", async () => {
    const { summary, install } = await meteredDay();
    const certificate = { number: "K-7", expandedPercent: 1.5, k: 2 };
    const made = await install({ meterPlate: { accuracyClass: 3, certificate } });
    expect(made.plateTerm?.expandedPercent).toBeCloseTo(1.5, 10);
    expect((await summary()).plusMinus.heating.energy).toMatchObject({
      percent: 1.5,
      basis: "evidence",
    });
  });

  it("joins what was worked out from flow and temperatures in the same day", async () => {
    const { summary, workings, install } = await meteredDay({ waterRows: 48 });
    await install({ meterPlate: { accuracyClass: 2 } });
    const { plusMinus, totals } = await summary();
    expect(totals.volumeM3).toBeCloseTo(28.8 * 12, 6);
    // The day as one row holds both: the wider of the two budgets speaks for it.
    expect(plusMinus.heating.energy?.percent).toBeGreaterThan(8.31);
    expect(plusMinus.volume).not.toBeNull();
    expect((await workings("energy")).installations).toHaveLength(1);
  });
});

describe("the plate of a meter", () => {
  it("is shown with its ± before anything is kept, and checked at its bounds", async () => {
    const { agent, point } = await meteredDay();
    const tryIt = (meterPlate: object) =>
      agent.post(`/points/${point.id}/installations/try`, {
        startsAt: "2026-02-01T00:00:00Z",
        meterPlate,
      });
    const found: WorkedOutInstallation = (await tryIt({ accuracyClass: 1 }).expect(200)).body;
    expect(found.plateTerm?.expandedPercent).toBeCloseTo(7.043673, 5);
    await tryIt({ accuracyClass: 4 }).expect(422);
    const refused = await tryIt({ accuracyClass: 2, minimumDeltaTK: 0 }).expect(422);
    // For people in their own words, for scripts in English.
    expect(refused.body.errors).toEqual([
      {
        pointer: "/body/meterPlate/minimumDeltaTK",
        code: "too-small",
        message: expect.stringMatching(/0/),
        bound: { of: "number", limit: 0, included: false },
      },
    ]);
  });

  it("is unknown in a record from before it could be kept", async () => {
    const { agent, point, install } = await meteredDay();
    const { id } = await install({});
    const row = await InstallationRow.findByPk(id, { rejectOnEmpty: true });
    const older: Partial<InstallationRow["document"]> = { ...row.document };
    delete older.meterPlate;
    await row.update({ document: older as InstallationRow["document"] });
    const list = await agent.get(`/points/${point.id}/installations`).expect(200);
    expect((list.body as { items: Installation[] }).items[0]).toMatchObject({
      id,
      meterPlate: null,
      plateTerm: null,
    });
  });
});
