import type { MeterComparison, MeterComparisonResult } from "@shared/contracts/meter-comparisons";
import { AuditEvent } from "@server/models/audit-event";
import type { MeteringPoint } from "@server/models/metering-point";
import { MeteringPoint as Point } from "@server/models/metering-point";
import { meterComparisonBody as s04 } from "@server/testing/comparison-factories";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { loggedRows, storedReadings, type RowWishes } from "@server/testing/reading-factories";
import { testApp } from "@server/testing/test-app";

const app = testApp();

async function engineerWithSite() {
  const engineer = await signedIn(app, { role: "engineer" });
  return { engineer, ...(await pointToMeter(app, engineer.organisationId)) };
}

async function tried(
  agent: Agent,
  siteId: string,
  changes: object = {},
): Promise<MeterComparisonResult> {
  const body = { ...s04, ...changes };
  return (await agent.post(`/sites/${siteId}/meter-comparisons/trial`, body).expect(200)).body;
}

async function refused(agent: Agent, siteId: string, changes: object) {
  const body = { ...s04, ...changes };
  const answer = await agent.post(`/sites/${siteId}/meter-comparisons/trial`, body).expect(422);
  return (answer.body.errors as { pointer: string; code: string }[]).map(({ pointer, code }) => [
    pointer,
    code,
  ]);
}

async function saved(agent: Agent, siteId: string, changes: object = {}): Promise<MeterComparison> {
  const body = { ...s04, ...changes };
  return (await agent.post(`/sites/${siteId}/meter-comparisons`, body).expect(201)).body;
}

/** Within the tolerance the worked case is given with. */
const near = (value: number) => expect.closeTo(value, -Math.log10(2e-4 * Math.abs(value)));

describe("S04: a portable against the permanent meter, then in its place", () => {
  test("the class gives the permanent meter's ±, part by part, and the two agree", async () => {
    const { engineer, site } = await engineerWithSite();
    const result = await tried(engineer, site.id);
    expect(result.hours).toBe(72);
    expect(result.second).toMatchObject({
      energyKwh: { value: 2427, expanded: near(103.6852), percent: near(4.272153) },
      limits: {
        flowPercent: near(2.047619),
        pairPercent: near(0.9891304),
        calculatorPercent: near(0.6630435),
        totalPercent: near(3.699793),
        expandedPercent: near(4.272153),
      },
    });
    expect(result.first.energyKwh.expanded).toEqual(near(140.6496));
    expect(result.energy).toMatchObject({
      difference: near(84.6),
      differencePercent: near(3.485785),
      en: near(0.484157),
      code: "agree",
    });
    expect(result.verdict).toBe("agree");
    expect(result.because).toEqual([]);
  });

  test("a portable that reads 2781.0 kWh does not agree", async () => {
    const { engineer, site } = await engineerWithSite();
    const result = await tried(engineer, site.id, { first: { ...s04.first, energyKwh: 2781 } });
    expect(result.verdict).toBe("disagree");
    expect(result.energy.en).toEqual(near(1.892093));
  });

  test("the outage is measured and estimated apart, each with its label and its share", async () => {
    const { engineer, site } = await engineerWithSite();
    const { standIn, cautions } = await tried(engineer, site.id);
    expect(standIn).toEqual({
      parts: [
        { code: "substitutedPortable", energyKwh: 2093.7, hours: 61.25, expandedKwh: null },
        {
          code: "estimatedDegreeHours",
          energyKwh: near(640.4859),
          hours: 18.75,
          expandedKwh: null,
        },
      ],
      totalKwh: near(2734.186),
      expandedKwh: null,
      estimatedPercent: near(23.4251),
    });
    expect(cautions).toEqual(expect.arrayContaining(["consentMissing", "indicative"]));
  });

  test("without degree-hours time scales the rest, and says so", async () => {
    const { engineer, site } = await engineerWithSite();
    const standIn = { ...s04.standIn, degreeHours: null, coveredPercent: 5, estimatePercent: 20 };
    const result = await tried(engineer, site.id, {
      standIn: { ...standIn, consentBy: "A. Owner" },
    });
    // 2093.7 · 18.75/61.25 = 640.9286; √((2734.6286·0.05)² + (640.9286·0.2)²) = 187.4221.
    expect(result.standIn?.parts[1]).toMatchObject({
      code: "estimatedTime",
      energyKwh: near(640.9286),
    });
    expect(result.standIn?.expandedKwh).toBeCloseTo(187.4221, 3);
    expect(result.cautions).toContain("consentRecorded");
    expect(result.cautions).not.toContain("consentMissing");
  });
});

describe("what cannot be compared is refused at its field", () => {
  const fell = { opening: 99_640, closing: 318 };

  test("a register that went backwards is never taken by its size", async () => {
    const { engineer, site } = await engineerWithSite();
    const side = (energy: object) => ({ second: { ...s04.second, energy } });
    expect(await refused(engineer, site.id, side(fell))).toEqual([
      ["/body/second/energy/closing", "register-fell"],
    ]);
    expect(await refused(engineer, site.id, side({ ...fell, rolledOver: true }))).toEqual([
      ["/body/second/energy/digits", "digits-needed"],
    ]);
    const rolled = { ...fell, rolledOver: true, digits: 5, multiplier: 10 };
    const result = await tried(engineer, site.id, side(rolled));
    expect(result.second.energyKwh.value).toBe(6780);
    expect(result.cautions).toContain("rolloverAsStated");
  });

  test("units of the plate are brought to kWh and m³", async () => {
    const { engineer, site } = await engineerWithSite();
    const result = await tried(engineer, site.id, {
      second: {
        ...s04.second,
        energy: { opening: 10, closing: 18.7372, unit: "GJ" },
        volume: { opening: 0, closing: 120_000, unit: "L" },
      },
    });
    expect(result.second.energyKwh.value).toBeCloseTo(8.7372 / 0.0036, 6);
    expect(result.second.volumeM3).toMatchObject({ value: 120, percent: near(2.364387) });
  });

  test("a stand-in needs covered time to scale from, and no more than the outage", async () => {
    const { engineer, site } = await engineerWithSite();
    const standIn = (changes: object) => ({ standIn: { ...s04.standIn, ...changes } });
    expect(await refused(engineer, site.id, standIn({ coveredHours: 81 }))).toEqual([
      ["/body/standIn/coveredHours", "covered-beyond-outage"],
    ]);
    const none = { degreeHours: { covered: 0, missing: 251 } };
    expect(await refused(engineer, site.id, standIn(none))).toEqual([
      ["/body/standIn/degreeHours/covered", "nothing-to-scale-from"],
    ]);
  });

  test("a period ends after it starts, and points of one site on one register stand in it", async () => {
    const { engineer, site, point } = await engineerWithSite();
    expect(await refused(engineer, site.id, { to: s04.from })).toEqual([
      ["/body/to", "empty-range"],
    ]);
    const other = await pointToMeter(app, engineer.organisationId);
    const first = { kind: "point", pointId: other.point.id, register: "cooling" };
    expect(await refused(engineer, site.id, { first })).toEqual([
      ["/body/first/pointId", "no-such-point"],
    ]);
    const own = { ...first, pointId: point.id };
    expect(await refused(engineer, site.id, { first: own })).toEqual([
      ["/body/first/pointId", "no-energy-in-period"],
    ]);
    expect(await refused(engineer, site.id, { first: own, second: own })).toEqual([
      ["/body/second/pointId", "choose-another"],
    ]);
  });

  test("another organisation's point is not found", async () => {
    const { engineer, site } = await engineerWithSite();
    const stranger = await engineerWithSite();
    const first = { kind: "point", pointId: stranger.point.id, register: "cooling" };
    await engineer.post(`/sites/${site.id}/meter-comparisons/trial`, { ...s04, first }).expect(404);
  });
});

test("errors that cancel in energy show in volume and ΔT", async () => {
  const { engineer, site } = await engineerWithSite();
  const typed = { kind: "typed", expandedPercent: 3, volumePercent: 2, deltaTPercent: 2 };
  const result = await tried(engineer, site.id, {
    first: { ...typed, name: "One", energyKwh: 1000, volumeM3: 100, deltaTK: 8.6 },
    second: { ...typed, name: "Two", energyKwh: 995, volumeM3: 90, deltaTK: 9.5 },
    standIn: null,
  });
  expect(result).toMatchObject({ verdict: "agree", errorsCancel: true, standIn: null });
  expect([result.volume?.code, result.deltaT?.code]).toEqual(["disagree", "disagree"]);
  expect(result.cautions).not.toContain("partsNotCompared");
});

test("without a stated ± nothing is concluded, and it is said why", async () => {
  const { engineer, site } = await engineerWithSite();
  const first = { ...s04.first, expandedPercent: null };
  const result = await tried(engineer, site.id, { first });
  expect(result).toMatchObject({ verdict: "inconclusive", because: ["firstWithoutUncertainty"] });
  expect(result.energy.en).toBeNull();
});

describe("metering points of the product", () => {
  const fromMs = Date.parse("2026-02-02T00:00:00Z");
  const quarterHour = 900_000;
  const days = 3;

  /** Quarter-hour means of three days: low, middle and high flow in turn, 5.9 K. */
  async function measured(
    agent: Agent,
    point: MeteringPoint,
    factor: (row: number) => number,
    wishes: Partial<RowWishes> = {},
  ): Promise<void> {
    await storedReadings(
      app,
      { organisationId: agent.organisationId, pointId: point.id },
      loggedRows({
        fromMs,
        count: days * 96,
        stepMs: quarterHour,
        flow: (row) => [10, 20, 30][row % 3]! * factor(row),
        ...wishes,
      }),
      quarterHour,
      "meanFromLabel",
    );
  }

  async function secondPoint(agent: Agent, beside: MeteringPoint): Promise<MeteringPoint> {
    const { organisationId } = agent;
    const { loopId, meterSide } = beside;
    const fields = { code: "P-check", name: "Check", role: "branch" as const };
    const createdAt = app.clock.date();
    return Point.create({ organisationId, loopId, meterSide, createdAt, ...fields });
  }

  const cooling = (point: MeteringPoint) => ({
    kind: "point",
    pointId: point.id,
    register: "cooling",
  });

  test("a point brings the energy and the ± its own page shows", async () => {
    const { engineer, site, point } = await engineerWithSite();
    await measured(engineer, point, () => 1);
    const result = await tried(engineer, site.id, { first: cooling(point), standIn: null });
    const range = `from=${s04.from}&to=${s04.to}`;
    const { body } = await engineer
      .get(`/points/${point.id}/energy?${range}&step=total`)
      .expect(200);
    const { totals, plusMinus } = body;
    expect(result.first.energyKwh.value).toBeCloseTo(totals.cooling.energyKwh, 3);
    expect(result.first.energyKwh.expanded).toBeCloseTo(plusMinus.cooling.energy.expanded, 6);
    expect(result.first.volumeM3?.expanded).toBeCloseTo(plusMinus.volume.expanded, 6);
    expect(result.first.deltaTK?.expanded).toBeCloseTo(plusMinus.cooling.deltaT.expanded, 6);
    expect(result.first.point).toMatchObject({ coverage: 1, basis: "defaults" });
    expect(result.cautions).toContain("defaultsOnly");
  });

  test("a point with holes is no witness of a meter that never paused", async () => {
    const { engineer, site, point } = await engineerWithSite();
    await measured(engineer, point, () => 1, { without: (row) => row >= 250 });
    const result = await tried(engineer, site.id, { first: cooling(point), standIn: null });
    expect(result.first.point?.coverage).toBeCloseTo(250 / 288, 6);
    expect(result).toMatchObject({ verdict: "inconclusive", because: ["coverageLow"] });
    expect(result.cautions).toContain("coverageBelow95");
  });

  test("two points are compared over common time, band by band, and cancelling bands show", async () => {
    const { engineer, site, point } = await engineerWithSite();
    const other = await secondPoint(engineer, point);
    // Low flow read 60 % high, high flow 20 % low: 16 + 20 + 24 against 10 + 20 + 30.
    await measured(engineer, point, (row) => [1.6, 1, 0.8][row % 3]!);
    await measured(engineer, other, () => 1, { without: (row) => row < 12 });
    const result = await tried(engineer, site.id, {
      first: cooling(point),
      second: cooling(other),
      standIn: null,
    });
    expect(result.energy.differencePercent).toBeCloseTo(0, 3);
    expect(result.verdict).toBe("agree");
    expect(result.cautions).toContain("commonTimeOnly");
    expect(result.byFlow?.quarterHours).toBe(288 - 12);
    expect(result.byFlow?.bands.map(({ quarterHours }) => quarterHours)).toEqual([92, 92, 92]);
    const [low, middle, high] = result.byFlow?.bands ?? [];
    expect(low?.agreement.differencePercent).toBeCloseTo(60, 3);
    expect(middle?.agreement.code).toBe("agree");
    expect(high?.agreement.differencePercent).toBeCloseTo(-20, 3);
    expect(low?.agreement.code).toBe("disagree");
    expect(result.byFlow?.compensating).toBe(true);
    // 16, 20, 24 over 10, 20, 30.
    expect(result.byFlow?.line?.slope).toBeCloseTo(0.4, 6);
    expect(result.byFlow?.line?.intercept).toBeCloseTo(12, 6);
  });

  test("two points with one kit behind them are no witnesses of each other", async () => {
    const { engineer, site, point } = await engineerWithSite();
    const other = await secondPoint(engineer, point);
    const { body: meter } = await engineer
      .post("/instruments", { kind: "flowMeter", serial: "F-9" })
      .expect(201);
    for (const each of [point, other]) {
      await measured(engineer, each, () => 1);
      const body = { startsAt: "2026-02-01T09:00:00Z", flowMeterId: meter.id };
      await engineer.post(`/points/${each.id}/installations`, body).expect(201);
    }
    const sides = { first: cooling(point), second: cooling(other), standIn: null };
    const result = await tried(engineer, site.id, sides);
    expect(result).toMatchObject({ verdict: "inconclusive", because: ["sharedInstruments"] });
  });

  test("a permanent meter logged here takes its ± from its class", async () => {
    const { engineer, site, point } = await engineerWithSite();
    await measured(engineer, point, () => 1);
    const second = { ...cooling(point), claim: s04.second.claim };
    const result = await tried(engineer, site.id, { second, standIn: null });
    expect(result.second.energyKwh.percent).toEqual(near(4.272153));
    expect(result.second.limits?.totalPercent).toEqual(near(3.699793));
    expect(result.cautions).not.toContain("defaultsOnly");
  });

  test("a saved comparison says when the readings behind it have changed since", async () => {
    const { engineer, site, point } = await engineerWithSite();
    await measured(engineer, point, () => 1);
    const comparison = await saved(engineer, site.id, { first: cooling(point), standIn: null });
    expect(comparison.readingsChanged).toBe(false);
    await measured(engineer, point, () => 1.1);
    const { body } = await engineer.get(`/meter-comparisons/${comparison.id}`).expect(200);
    expect(body.readingsChanged).toBe(true);
    expect(body.result).toEqual(comparison.result);
  });
});

describe("saved comparisons", () => {
  test("are kept as they came out, corrected by another and withdrawn with a reason", async () => {
    const { engineer, site } = await engineerWithSite();
    const first = await saved(engineer, site.id);
    expect(first).toMatchObject({ state: "stands", title: s04.title, can: { edit: true } });
    expect([first.from, first.to]).toEqual([
      "2026-02-02T00:00:00.000Z",
      "2026-02-05T00:00:00.000Z",
    ]);
    const second = await saved(engineer, site.id, { title: "Corrected", supersedes: first.id });
    const before = (await engineer.get(`/meter-comparisons/${first.id}`).expect(200)).body;
    expect(before).toMatchObject({
      state: "superseded",
      supersededById: second.id,
      result: first.result,
      can: { edit: false },
    });
    const again = { ...s04, supersedes: first.id };
    const conflict = await engineer.post(`/sites/${site.id}/meter-comparisons`, again).expect(409);
    expect(conflict.body.code).toBe("superseded-already");
    const { body: listed } = await engineer.get(`/meter-comparisons?siteId=${site.id}`).expect(200);
    expect(listed).toMatchObject({
      items: [{ id: second.id, verdict: "agree", errorsCancel: false, hasStandIn: true }],
      can: { create: true },
    });
    const reason = "Reads of another meter";
    const gone = await engineer
      .post(`/meter-comparisons/${second.id}/withdrawal`, { reason })
      .expect(200);
    expect(gone.body).toMatchObject({ state: "withdrawn", withdrawnReason: reason });
    await engineer.post(`/meter-comparisons/${second.id}/withdrawal`, { reason }).expect(409);
    const list = async (query: string) =>
      (await engineer.get(`/meter-comparisons?siteId=${site.id}${query}`).expect(200)).body.items;
    expect(await list("")).toEqual([]);
    expect((await list("&superseded=true")).map(({ id }: { id: string }) => id)).toEqual([
      second.id,
      first.id,
    ]);
    const kinds = await AuditEvent.findAll({
      where: { subjectKind: "meter-comparison", organisationId: engineer.organisationId },
      order: [["id", "ASC"]],
    });
    expect(kinds.map(({ kind }) => kind)).toEqual([
      "meter-comparison-saved",
      "meter-comparison-corrected",
      "meter-comparison-withdrawn",
    ]);
  });

  test("a surveyor tries one and reads all, and keeps none", async () => {
    const { engineer, site } = await engineerWithSite();
    const { organisationId } = engineer;
    const comparison = await saved(engineer, site.id);
    const surveyor = await signedIn(app, { role: "surveyor", organisationId });
    expect((await tried(surveyor, site.id)).verdict).toBe("agree");
    const { body } = await surveyor.get(`/meter-comparisons/${comparison.id}`).expect(200);
    expect(body.can.edit).toBe(false);
    await surveyor.post(`/sites/${site.id}/meter-comparisons`, s04).expect(403);
  });

  test("the CSV carries every figure, with text that no spreadsheet runs", async () => {
    const { engineer, site } = await engineerWithSite();
    const { id } = await saved(engineer, site.id, { title: "=1+1" });
    const { text } = await engineer.get(`/meter-comparisons/${id}/comparison.csv`).expect(200);
    expect(text).toContain("Comparison,Title,'=1+1");
    expect(text).toContain("Second meter,Expanded uncertainty from the class,4.272153,%");
    expect(text).toContain("Energy,E_n,0.484157,,,agree");
    expect(text).toMatch(/Stand-in,estimated \(degree-hour\),640\.48592\d,kWh,,18\.75 h/);
    expect(text).toContain("Cautions,indicative,yes");
  });

  test("a site that holds one is archived, not removed", async () => {
    const { engineer } = await engineerWithSite();
    const fields = { name: "Bare", zone: "UTC", currency: "EUR" };
    const site = (await engineer.post("/sites", fields).expect(201)).body;
    await saved(engineer, site.id);
    const refusal = await engineer.delete(`/sites/${site.id}`).expect(409);
    expect(refusal.body.code).toBe("holds-comparisons");
  });
});
