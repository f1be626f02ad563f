import type { EnergyAnswer, PointSummary, TodayAnswer } from "@shared/contracts/energy";
import type { BathCheck, Instrument } from "@shared/contracts/evidence";
import type { PointShape } from "@shared/contracts/shape";
import type { Workings } from "@shared/contracts/workings";
import type { MeteringPoint } from "@server/models/metering-point";
import type { Loop } from "@server/models/loop";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { loggedRows, storedReadings } from "@server/testing/reading-factories";
import { runJobs } from "@server/testing/run-jobs";
import { testApp } from "@server/testing/test-app";

const app = testApp();

/*
 * The worked interval: meter on the return, 28.8 m³/h (8.000 L/s), 6.90 → 12.80 °C, everything about
 * the installation on record. Of power, standard, %:
 *   does not shrink: certificate 0.5, drift 0.5/√3 = 0.288675, zero 0.010/√3/0.960771 = 0.600924,
 *     bore 2·0.227010/102.965 = 0.440945, profile 2/√3 = 1.154701, remount 0.4, density 0.0288956,
 *     enthalpy 0.05, pair 0.030/5.9 = 0.508475, mounting 0.10/√3/5.9 = 0.978560,
 *     pair drift 0.03/√3/5.9 = 0.293568                                → 1.92038
 *   logger steps: ΔT 0.0691946, flow 0.0360844
 *   noise: flow 0.8, ΔT 0.02/5.9 = 0.338983, alignment 0.3
 * One reading: √(1.92038² + 0.922496²) = 2.13046, so U = 4.26092 %.
 */
const SYSTEMATIC = 1.92038;
const STEPS = Math.hypot(0.0691946, 0.0360844);
const NOISE = Math.hypot(0.8, 0.338983, 0.3);
/** U of `rows` like readings with ρ = 0: noise ÷ √N; steps repeat, as nothing moves. */
const expandedOf = (rows: number, systematic = SYSTEMATIC) =>
  2 * Math.hypot(systematic, STEPS, NOISE / Math.sqrt(rows));

/*
 * A later check leaves 0.060 K where the first left 0.030 K: 100·0.060/5.9 = 1.016949 % instead of
 * 0.508475 %, so u_S² = 1.92038² − 0.508475² + 1.016949² = 3.687859 − 0.258547 + 1.034185 = 4.463497
 * and u_S = 2.112699 %.
 */
const SYSTEMATIC_AFTER = 2.112699;

const DAY = "2026-02-10";
const NEXT = "2026-02-11";
const startMs = Date.parse(`${DAY}T00:00:00Z`);
const quarterHour = 900_000;

async function make<Answer>(agent: Agent, path: string, body: object): Promise<Answer> {
  return (await agent.post(path, body).expect(201)).body as Answer;
}

/** Ten like readings of both probes: no difference, and the bath alone leaves something. */
const bath = (bathUncertaintyK: number) => ({
  bathUncertaintyK,
  readings: Array.from({ length: 10 }, () => ({ firstC: 8, secondC: 8 })),
});

interface Measured {
  agent: Agent;
  point: MeteringPoint;
  loop: Loop;
  check: BathCheck;
}

/** A chilled loop at 1.6 MPa absolute with a day of steady quarter-hour means, and all its evidence. */
async function measuredDay({ evidence = true, rows = 96 } = {}): Promise<Measured> {
  const agent = await signedIn(app, { role: "engineer" });
  const { loop, point } = await pointToMeter(app, agent.organisationId);
  await loop.update({ gaugePressureMPa: 1.498675 });
  await storedReadings(
    app,
    { organisationId: agent.organisationId, pointId: point.id },
    loggedRows({ fromMs: startMs, count: rows, stepMs: quarterHour }),
    quarterHour,
    "meanFromLabel",
  );
  const instrument = (kind: string, serial: string, probeClass?: string) =>
    make<Instrument>(agent, "/instruments", {
      kind,
      serial,
      ...(probeClass ? { probeClass } : {}),
    });
  const meter = await instrument("flowMeter", "F-1");
  await agent
    .post(`/instruments/${meter.id}/certificates`, {
      number: "C-1",
      issuedOn: "2026-01-12",
      dueOn: "2027-01-12",
      expanded: 1,
      k: 2,
    })
    .expect((answer) => expect([200, 201]).toContain(answer.status));
  const first = await instrument("probe", "T-1", "B");
  const second = await instrument("probe", "T-2", "B");
  const check = await make<BathCheck>(agent, "/bath-checks", {
    firstProbeId: first.id,
    secondProbeId: second.id,
    checkedOn: "2026-02-01",
    ...bath(0.03),
  });
  const probe = (id: string) => ({
    probeId: id,
    mounting: "surface",
    depthMm: null,
    insulated: true,
  });
  if (evidence)
    await make(agent, `/points/${point.id}/installations`, {
      startsAt: "2026-02-01T09:00:00Z",
      flowMeterId: meter.id,
      flowDriftPercent: 0.5,
      flowStepLPerS: 0.01,
      pipe: {
        circumferenceMm: 359.1,
        outsideDiameterMm: null,
        wallReadingsMm: [5.62, 5.71, 5.66, 5.69],
        liningMm: 0,
      },
      straightRun: { upstreamM: 0.92, downstreamM: 0.61, nearestFitting: "bend" },
      zero: {
        flowStopped: true,
        readingMPerS: 0.012,
        remainingMPerS: 0.01,
        action: "setOnMeter",
      },
      remountPercent: 0.4,
      probes: { supply: probe(first.id), return: probe(second.id) },
      mountingK: 0.1,
      temperatureStepK: 0.01,
      noise: { flowPercent: 0.8, deltaTK: 0.02, autocorrelation: 0 },
    });
  return { agent, point, loop, check };
}

const workingsOf = async (agent: Agent, pointId: string, query: string): Promise<Workings> =>
  (await agent.get(`/points/${pointId}/workings?${query}`).expect(200)).body;
const day = `from=${DAY}&to=${NEXT}`;

async function summaryOf({ agent, point }: Measured): Promise<PointSummary> {
  return (await agent.get(`/points/${point.id}/summary?${day}`).expect(200)).body;
}

describe("the workings of the worked interval", () => {
  it("give one reading ± 4.26092 %, from sixteen terms that say where they are from", async () => {
    const { agent, point } = await measuredDay();
    const window = `from=${DAY}T10:00:00Z&to=${DAY}T10:15:00Z`;
    const workings = await workingsOf(agent, point.id, `figure=power&${window}`);
    expect(workings.value).toBeCloseTo(197.798, 3);
    expect(workings.unit).toBe("kW");
    expect(workings.plusMinus?.percent).toBeCloseTo(4.26092, 4);
    // 197.798 kW × 4.26092 % = 8.42802 kW
    expect(workings.plusMinus?.expanded).toBeCloseTo(8.42802, 4);
    // All is on record but how far the pair drifts: one check says nothing of that.
    expect(workings.plusMinus?.basis).toBe("partlyDefaults");
    const terms = workings.budget?.terms ?? [];
    expect(terms).toHaveLength(16);
    expect(terms.map(({ percent }) => percent)).toEqual(
      terms.map(({ percent }) => percent).sort((a, b) => b - a),
    );
    const percentOf = (kind: string) => terms.find(({ term }) => term.kind === kind)?.percent;
    expect(percentOf("profile")).toBeCloseTo(1.154701, 5);
    expect(percentOf("mounting")).toBeCloseTo(0.97856, 5);
    expect(percentOf("probePair")).toBeCloseTo(0.508475, 5);
    expect(percentOf("bore")).toBeCloseTo(0.440945, 4);
    expect(workings.budget?.deltaTWeightedVelocityMPerS).toBeCloseTo(0.960771, 4);
    expect(workings.installations).toMatchObject([
      { flowMeterSerial: "F-1", supplyProbeSerial: "T-1", share: 1 },
    ]);
    expect(workings.installations[0]?.verdicts.map(({ code }) => code)).toContain(
      "straightRunUpstreamShort",
    );
    expect(workings.cautions).toContain("indicativeOnly");
    expect(workings.cautions).not.toContain("pressureAssumed");
  });

  it("let a day's energy be checked by hand: V × k × ΔT", async () => {
    const { agent, point } = await measuredDay();
    const workings = await workingsOf(agent, point.id, `figure=energy&${day}`);
    // 28.8 m³/h × 24 h = 691.2 m³; k 4.19064 MJ/(m³·K) ÷ 3.6 = 1.164067 kWh/(m³·K); 5.90 K
    const factors = workings.byHand?.factors.map(({ value }) => value) ?? [];
    expect(factors[0]).toBeCloseTo(691.2, 2);
    expect(factors[1]).toBeCloseTo(1.164067, 5);
    expect(factors[2]).toBeCloseTo(5.9, 4);
    expect(workings.byHand?.result).toBeCloseTo(24 * 197.798, 0);
    expect(Math.abs(workings.byHand?.differencePercent ?? 1)).toBeLessThan(0.001);
    const input = (symbol: string) => workings.inputs.find((one) => one.symbol === symbol);
    expect(input("supply")).toMatchObject({
      unit: "°C",
      source: { instrument: "T-1", code: "read" },
    });
    expect(input("supply")?.value).toBeCloseTo(6.9, 4);
    expect(input("density")?.value).toBeCloseTo(1000.11, 2);
    // h(12.80) − h(6.90) = 55.3055 − 30.5834 kJ/kg
    expect(input("enthalpy")?.value).toBeCloseTo(24.7221, 3);
    expect(workings.formula).toBe("sumOfSteps");
    expect(workings.rows).toMatchObject({ measured: 96, excluded: 0, missing: 0, expected: 96 });
    expect(workings.files).toMatchObject([{ name: "log.csv", rows: 96 }]);
    expect(workings.formulasFrom.map(({ name }) => name)).toEqual(
      expect.arrayContaining(["IAPWS R7-97", "EN 1434-1", "JCGM 100"]),
    );
  });

  it("shrink by noise alone over a day, never by √N as a whole", async () => {
    const { agent, point } = await measuredDay();
    const { plusMinus } = await workingsOf(agent, point.id, `figure=energy&${day}`);
    expect(plusMinus?.percent).toBeCloseTo(expandedOf(96), 3);
    // Dividing everything by √96 would say 0.43 %.
    expect(plusMinus?.percent).toBeGreaterThan(3.8);
  });

  it("put what acts on flow to the volume, and what acts on ΔT to ΔT", async () => {
    const { agent, point } = await measuredDay();
    const volume = await workingsOf(agent, point.id, `figure=volume&${day}`);
    // flow: √(0.5² + 0.288675² + 0.600924² + 0.440945² + 1.154701² + 0.4²) = 1.543441 %,
    // the flow step 0.0360844 % and noise 0.8/√96 = 0.081650 %
    expect(volume.plusMinus?.percent).toBeCloseTo(2 * Math.hypot(1.543441, 0.0360844, 0.08165), 3);
    expect(volume.value).toBeCloseTo(691.2, 2);
    const deltaT = await workingsOf(agent, point.id, `figure=deltaT&${day}`);
    // ΔT: √(0.508475² + 0.978560² + 0.293568²) = 1.141188 %, step 0.0691946 %, noise 0.338983/√96
    const expected = 2 * Math.hypot(1.141188, 0.0691946, 0.338983 / Math.sqrt(96));
    expect(deltaT.plusMinus?.percent).toBeCloseTo(expected, 3);
    expect(deltaT.value).toBeCloseTo(5.9, 4);
  });
});

describe("the shape of a load", () => {
  it("carries the ± of the workings it opens", async () => {
    const { agent, point } = await measuredDay();
    const shape: PointShape = (
      await agent.get(`/points/${point.id}/shape?${day}&windowMinutes=15`).expect(200)
    ).body;
    const window = `from=${shape.peaks.fixed?.from}&to=${shape.peaks.fixed?.to}`;
    const peak = await workingsOf(agent, point.id, `figure=power&${window}`);
    expect(shape.peaks.fixed?.plusMinus).toEqual(peak.plusMinus);
    expect(shape.peaks.fixed?.plusMinus?.percent).toBeCloseTo(4.26092, 4);
    const mean = await workingsOf(agent, point.id, `figure=power&${day}`);
    expect(shape.meanPlusMinus).toEqual(mean.plusMinus);
    expect(shape.meanPlusMinus?.percent).toBeCloseTo(expandedOf(96), 3);
    const deltaT = await workingsOf(agent, point.id, `figure=deltaT&${day}`);
    expect(shape.deltaT.plusMinus.flowWeighted).toEqual(deltaT.plusMinus);
    // The load is steady: all three means are one, and so is what an offset does to them.
    expect(shape.deltaT.plusMinus.timeMean?.expanded).toBe(deltaT.plusMinus?.expanded);
    expect(shape.deltaT.plusMinus.energyWeighted?.percent).toBeCloseTo(
      deltaT.plusMinus?.percent ?? NaN,
      3,
    );
  });

  it("puts the ± of single steps to the base load, and takes flow's scale off water per heat", async () => {
    const { agent, point } = await measuredDay();
    const shape: PointShape = (await agent.get(`/points/${point.id}/shape?${day}`).expect(200))
      .body;
    // A steady load: two quarter-hours at the percentile, all systematic terms as they are.
    const percent = shape.baseLoad?.plusMinus?.percent ?? NaN;
    expect(percent).toBeCloseTo(expandedOf(2), 3);
    expect(shape.baseLoad?.plusMinus?.expanded).toBeCloseTo(
      ((shape.baseLoad?.powerKw ?? NaN) * percent) / 100,
      3,
    );
    // ΔT 1.141188, density 0.0288956, enthalpy 0.05, steps 0.0691946 and 0.0360844,
    // noise √(0.8² + 0.338983² + 0.3²)/√96; the zero is the same of both in a steady flow.
    const expected = 2 * Math.hypot(1.141188, 0.0288956, 0.05, STEPS, NOISE / Math.sqrt(96));
    expect(shape.specificFlow?.plusMinus?.percent).toBeCloseTo(expected, 3);
  });
});

describe("the summary of a range", () => {
  it("names the kit that speaks for it, its certificate as it stood then, and who may add", async () => {
    const measured = await measuredDay();
    const { evidence } = await summaryOf(measured);
    expect(evidence).toMatchObject({
      installations: [
        {
          from: "2026-02-01T09:00:00.000Z",
          to: null,
          flowMeter: { serial: "F-1", certificate: { dueOn: "2027-01-12", state: "inDate" } },
          probes: { supplySerial: "T-1", returnSerial: "T-2", checkedOn: "2026-02-01" },
        },
      ],
      can: { record: true },
    });
    const { point } = measured;
    const later = `/points/${point.id}/summary?from=2027-01-12&to=2027-01-14`;
    const ranOut: PointSummary = (await measured.agent.get(later).expect(200)).body;
    expect(ranOut.evidence?.installations[0]?.flowMeter?.certificate?.state).toBe("lapsed");
    const before = `/points/${point.id}/summary?from=2026-01-10&to=2026-01-11`;
    const nobody: PointSummary = (await measured.agent.get(before).expect(200)).body;
    expect(nobody.evidence).toEqual({ installations: [], can: { record: true } });
  });
});

describe("an offset from the first reading on", () => {
  it("counts as taken off every reading, though the range asked for begins before them", async () => {
    const { agent, point, check } = await measuredDay();
    await make(agent, "/bath-checks", {
      firstProbeId: check.firstProbeId,
      secondProbeId: check.secondProbeId,
      checkedOn: "2026-02-01",
      replaces: check.id,
      bathUncertaintyK: 0.03,
      readings: Array.from({ length: 10 }, () => ({ firstC: 8.1, secondC: 8 })),
    });
    const wider = `figure=energy&from=2026-02-09&to=${NEXT}`;
    const pairOf = ({ budget }: Workings) =>
      budget?.terms.find(({ term }) => term.kind === "probePair")?.term.origin.code;
    expect(pairOf(await workingsOf(agent, point.id, wider))).toBe("pairNotCorrected");
    const { id } = await make<{ id: string }>(agent, `/points/${point.id}/corrections`, {
      change: {
        kind: "probeOffset",
        probeId: check.firstProbeId,
        addK: -0.1,
        bathCheckId: null,
        from: new Date(startMs).toISOString(),
        to: null,
      },
      reason: "both probes in one bath",
    });
    await runJobs(app);
    await agent.post(`/corrections/${id}/application`, {}).expect(202);
    await runJobs(app);
    expect(pairOf(await workingsOf(agent, point.id, wider))).toBe("pairFromBath");
    expect(pairOf(await workingsOf(agent, point.id, `figure=energy&${day}`))).toBe("pairFromBath");
  });
});

describe("a bath check that is replaced", () => {
  it("changes the ± and the workings of every figure it touches, and no other", async () => {
    const measured = await measuredDay();
    const { agent, point, loop, check } = measured;
    const percents = async () => {
      const summary = await summaryOf(measured);
      const total: EnergyAnswer = (
        await agent.get(`/points/${point.id}/energy?${day}&step=total`).expect(200)
      ).body;
      const overview = (await agent.get(`/sites/${loop.siteId}/overview?${day}`).expect(200)).body
        .loops[0];
      const today: TodayAnswer = (await agent.get(`/sites/${loop.siteId}/today`).expect(200)).body;
      const workings = (figure: string, range = day) =>
        workingsOf(agent, point.id, `figure=${figure}&${range}`);
      const busiest = `from=${summary.busiest?.from}&to=${summary.busiest?.to}`;
      return {
        overDay: [
          summary.plusMinus.cooling.energy?.percent,
          summary.days[0]?.plusMinus.cooling?.percent,
          summary.busiestDay?.plusMinus?.percent,
          total.plusMinus?.cooling.energy?.percent,
          overview.plusMinus.cooling.energy.percent,
          today.loops[0]?.energyPlusMinus?.percent,
          today.loops[0]?.card?.plusMinus?.percent,
          (await workings("energy")).plusMinus?.percent,
          (await workings("energy")).budget?.expandedPercent,
          (await workings("power")).plusMinus?.percent,
        ],
        overHalfHour: [
          summary.busiest?.plusMinus?.percent,
          (await workings("power", busiest)).plusMinus?.percent,
        ],
        overNight: [
          summary.nightBase?.plusMinus?.percent,
          (await workings("nightBase")).plusMinus?.percent,
        ],
        volume: summary.plusMinus.volume?.percent,
        deltaT: summary.plusMinus.cooling.deltaT?.percent,
        readings: summary.totals,
      };
    };
    const before = await percents();
    // 96 rows a day, 2 in the half hour, 20 from midnight to five.
    for (const percent of before.overDay) expect(percent).toBeCloseTo(expandedOf(96), 3);
    for (const percent of before.overHalfHour) expect(percent).toBeCloseTo(expandedOf(2), 3);
    for (const percent of before.overNight) expect(percent).toBeCloseTo(expandedOf(20), 3);

    await make(agent, "/bath-checks", {
      firstProbeId: check.firstProbeId,
      secondProbeId: check.secondProbeId,
      checkedOn: "2026-02-01",
      replaces: check.id,
      ...bath(0.06),
    });
    const after = await percents();
    const wider = (rows: number) => expandedOf(rows, SYSTEMATIC_AFTER);
    for (const percent of after.overDay) expect(percent).toBeCloseTo(wider(96), 3);
    for (const percent of after.overHalfHour) expect(percent).toBeCloseTo(wider(2), 3);
    for (const percent of after.overNight) expect(percent).toBeCloseTo(wider(20), 3);
    // ΔT: √(1.016949² + 0.978560² + 0.293568²) = 1.441540 %
    const deltaT = 2 * Math.hypot(1.44154, 0.0691946, 0.338983 / Math.sqrt(96));
    expect(after.deltaT).toBeCloseTo(deltaT, 3);
    expect(after.deltaT).not.toBeCloseTo(before.deltaT ?? 0, 2);
    expect(after.volume).toBe(before.volume);
    expect(after.readings).toEqual(before.readings);
  });
});

describe("a figure whose ± nobody can vouch for", () => {
  it("stands on usual values where no installation is recorded, and says so", async () => {
    const { agent, point } = await measuredDay({ evidence: false });
    const workings = await workingsOf(agent, point.id, `figure=energy&${day}`);
    expect(workings.plusMinus?.basis).toBe("defaults");
    expect(workings.cautions).toEqual(expect.arrayContaining(["defaultsOnly", "boreUnknown"]));
    expect(workings.installations).toEqual([]);
    expect(workings.budget?.terms.every(({ term }) => term.origin.from === "default")).toBe(true);
    // The usual pair is two class B probes: √((0.3 + 0.005·6.9)² + (0.3 + 0.005·12.8)²)/√3 = 0.285416 K
    const pair = workings.budget?.terms.find(({ term }) => term.kind === "probePair");
    expect(pair?.percent).toBeCloseTo((100 * 0.285416) / 5.9, 3);
  });

  it("has none where nothing is covered, and none for rows, which are counted", async () => {
    const { agent, point } = await measuredDay();
    const empty = await workingsOf(agent, point.id, "figure=energy&from=2026-03-01&to=2026-03-02");
    expect(empty).toMatchObject({ value: null, plusMinus: null, budget: null, byHand: null });
    expect(empty.cautions).toContain("nothingCovered");
    const rows = await workingsOf(agent, point.id, `figure=completeness&${day}`);
    expect(rows).toMatchObject({ value: 100, unit: "%", plusMinus: null, formula: "coveredShare" });
    expect(rows.cautions).toContain("countedNoUncertainty");
  });

  it("covers a part of the day, says how much, and names what is missing", async () => {
    const { agent, point } = await measuredDay({ rows: 48 });
    const workings = await workingsOf(agent, point.id, `figure=energy&${day}`);
    expect(workings.coverage).toBeCloseTo(0.5, 4);
    expect(workings.cautions).toContain("coverageBelow95");
    expect(workings.rows).toMatchObject({ measured: 48, missing: 48, expected: 96 });
  });
});

describe("workings to take away", () => {
  it("are a CSV that no spreadsheet runs, with the same ±", async () => {
    const { agent, point, loop } = await measuredDay();
    await loop.update({ name: "=cmd|' /C calc'!A0" });
    const answer = await agent
      .get(`/points/${point.id}/workings.csv?figure=energy&${day}`)
      .expect(200);
    expect(answer.headers["content-type"]).toContain("text/csv");
    const lines = answer.text.split("\r\n");
    expect(lines[0]).toBe("\uFEFFSection,Item,Value,Unit,Detail");
    expect(lines.some((line) => line.includes("'=cmd|"))).toBe(true);
    const percent = lines
      .find((line) => line.includes(",%,partlyDefaults"))
      ?.split(",")
      .at(-3);
    expect(Number(percent)).toBeCloseTo(expandedOf(96), 3);
  });

  it.each(["en", "de"])("are an A4 page as PDF, in %s", async (language) => {
    const { agent, point } = await measuredDay();
    const address = `/points/${point.id}/workings.pdf?figure=energy&${day}&language=${language}`;
    const answer = await agent.get(address).buffer(true).expect(200);
    expect(answer.headers["content-type"]).toBe("application/pdf");
    expect(answer.headers["content-disposition"]).toMatch(/energy_2026-02-10\.pdf/);
    const page = Buffer.from(answer.body as Buffer);
    expect(page.subarray(0, 5).toString("latin1")).toBe("%PDF-");
    // A4 in points, as the page says itself.
    expect(page.toString("latin1")).toContain("/MediaBox [0 0 595.28 841.89]");
  });

  it("refuse a range that cuts a quarter-hour", async () => {
    const { agent, point } = await measuredDay();
    const cut = `from=${DAY}T10:05:00Z&to=${DAY}T11:00:00Z`;
    await agent.get(`/points/${point.id}/workings?figure=power&${cut}`).expect(422);
  });
});
