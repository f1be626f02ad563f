import type { EnergyAnswer, PointSummary, SeriesAnswer } from "@shared/contracts/energy";
import { HOUR_MS, MINUTE_MS } from "@shared/domain/time/interval";
import { unpackNumbers } from "@shared/domain/readings/packed-numbers";
import { RowQuality } from "@shared/domain/readings/reading-columns";
import { signedIn, type Agent } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { loggedRows, storedReadings, type RowWishes } from "@server/testing/reading-factories";
import { testApp } from "@server/testing/test-app";

const app = testApp();

/*
 * Steady 28.8 m³/h at 6.90 → 12.80 °C with the meter on the return cools 197.798 kW (the worked
 * interval of the trade's own example, recomputed with IAPWS-IF97), so an hour is 197.798 kWh.
 */
const steadyKw = 197.798;

async function meteredPoint(
  rows: RowWishes | null,
  wishes: Parameters<typeof pointToMeter>[2] & { tag?: string } = {},
): Promise<{ engineer: Agent; pointId: string }> {
  const engineer = await signedIn(app);
  const { point, loop } = await pointToMeter(app, engineer.organisationId, {
    meterSide: "return",
    ...wishes,
  });
  if (wishes.tag) await loop.update({ tag: wishes.tag });
  if (rows)
    await storedReadings(
      app,
      { organisationId: engineer.organisationId, pointId: point.id },
      loggedRows(rows),
      rows.stepMs,
    );
  return { engineer, pointId: point.id };
}

const energyOf = async (agent: Agent, pointId: string, query: string): Promise<EnergyAnswer> =>
  (await agent.get(`/points/${pointId}/energy?${query}`).expect(200)).body;

describe("getEnergy", () => {
  // IANA tz database: Paris has 25 h on 26 October 2025 and 23 h on 30 March 2025.
  it.each([
    ["2025-10-26", "2025-10-27", 25],
    ["2025-03-30", "2025-03-31", 23],
    ["2026-01-10", "2026-01-11", 24],
  ])("gives the local day %s all its hours", async (from, to, hours) => {
    const { engineer, pointId } = await meteredPoint(
      { fromMs: Date.parse(`${from}T00:00:00Z`) - 4 * HOUR_MS, count: 33 * 60, stepMs: MINUTE_MS },
      { zone: "Europe/Paris" },
    );
    const day = await energyOf(engineer, pointId, `from=${from}&to=${to}&step=day`);
    expect(day.columns?.lengthS).toEqual([hours * 3600]);
    expect(day.columns?.coolingKwh[0]).toBeCloseTo(hours * steadyKw, 1);
    expect(day.columns?.heatingKwh).toEqual([0]);
    const hourly = await energyOf(engineer, pointId, `from=${from}&to=${to}&step=hour`);
    expect(hourly.columns?.coolingKwh).toHaveLength(hours);
    const total = await energyOf(engineer, pointId, `from=${day.from}&to=${day.to}&step=total`);
    expect(total.totals.cooling.energyKwh).toBeCloseTo(hours * steadyKw, 1);
    expect(total.columns).toBeNull();
  });

  it("says how much of the time it covers, and leaves a hole null instead of zero", async () => {
    const { engineer, pointId } = await meteredPoint({
      fromMs: Date.UTC(2026, 0, 10),
      count: 180,
      stepMs: MINUTE_MS,
      without: (row) => row > 60 && row < 120,
    });
    const answer = await energyOf(
      engineer,
      pointId,
      "from=2026-01-10T00:00:00Z&to=2026-01-10T03:00:00Z&step=hour",
    );
    expect(answer.columns?.coveredS).toEqual([3600, 0, 59 * 60]);
    expect(answer.columns?.coolingKwh[1]).toBeNull();
    expect(answer.totals.coverage).toBeCloseTo(119 / 180, 4);
    const hole = "from=2026-01-10T01:15:00Z&to=2026-01-10T01:45:00Z&step=total";
    const { totals } = await energyOf(engineer, pointId, hole);
    expect(totals).toMatchObject({ coverage: 0, volumeM3: null, cooling: { energyKwh: null } });
  });

  it.each([
    ["from=2026-01-10&to=2026-01-10", "empty-range"],
    ["from=2026-01-10&to=2026-01-11T00:00:00Z", "mixed-range"],
    ["from=2026-01-10T00:07:00Z&to=2026-01-11T00:00:00Z&step=hour", "not-a-quarter-hour"],
    ["from=2020-01-01&to=2026-01-01&step=quarterHour", "too-many-rows"],
  ])("refuses %s", async (query, code) => {
    const { engineer, pointId } = await meteredPoint(null);
    const answer = await engineer.get(`/points/${pointId}/energy?${query}`).expect(422);
    expect(answer.body.errors[0].code).toBe(code);
  });

  it("answers 404 to another organisation", async () => {
    const { pointId } = await meteredPoint(null);
    const stranger = await signedIn(app);
    await stranger.get(`/points/${pointId}/energy?from=2026-01-01&to=2026-01-02`).expect(404);
  });
});

describe("getPointSummary", () => {
  it("finds the busiest half hour, its day, the night base and what was left out", async () => {
    const from = Date.UTC(2026, 0, 12);
    const { engineer, pointId } = await meteredPoint(
      {
        fromMs: from,
        count: 2 * 1440,
        stepMs: MINUTE_MS,
        // A tenth of the flow until 05:00, and a busy stretch on the second day, 10:30 to 11:00.
        flow: (row) =>
          row >= 1440 + 630 && row <= 1440 + 660 ? 57.6 : row % 1440 < 300 ? 2.88 : 28.8,
        quality: (row) => (row >= 800 && row < 837 ? RowQuality.excluded : RowQuality.measured),
        without: (row) => row >= 1000 && row < 1051,
      },
      { zone: "Europe/London" },
    );
    const answer = await engineer
      .get(`/points/${pointId}/summary?from=2026-01-12&to=2026-01-14`)
      .expect(200);
    const summary: PointSummary = answer.body;
    expect(summary.busiest?.from).toBe("2026-01-13T10:30:00.000Z");
    expect(summary.busiest?.powerKw).toBeCloseTo(2 * steadyKw, 1);
    expect(summary.busiestDay?.date).toBe("2026-01-13");
    expect(summary.nightBase).toMatchObject({ fromHour: 0, toHour: 5, register: "cooling" });
    expect(summary.nightBase?.powerKw).toBeCloseTo(steadyKw / 10, 0);
    expect(summary.leftOut.map((run) => [run.kind, run.rows, run.reason])).toEqual([
      ["excluded", 37, "weakSignal"],
      ["missing", 51, "noRows"],
    ]);
    expect(summary.totals.rows).toMatchObject({ measured: 2 * 1440 - 88, expected: 2 * 1440 });
    expect(summary.days.map((day) => day.date)).toEqual(["2026-01-12", "2026-01-13"]);
    expect(summary.totals.cooling.flowWeightedDeltaTK).toBeCloseTo(5.9, 6);
  });

  it("gives a glycol loop energy, and says what it was worked out with", async () => {
    const { engineer, pointId } = await meteredPoint(
      { fromMs: Date.UTC(2026, 0, 12), count: 1441, stepMs: MINUTE_MS },
      { zone: "UTC", fluidKind: "propyleneGlycol" },
    );
    const { body } = await engineer
      .get(`/points/${pointId}/summary?from=2026-01-12&to=2026-01-13`)
      .expect(200);
    const summary: PointSummary = body;
    expect(summary.basis).toMatchObject({
      blockedBy: null,
      fluid: { kind: "propyleneGlycol", percent: 30, basis: "mass" },
      liquidC: { highest: 100 },
    });
    // ASHRAE tables: 29.4 % by volume freezes at −12.7 °C.
    expect(summary.basis.liquidC?.lowest).toBeCloseTo(-12.7, 1);
    expect(summary.totals.cooling.energyKwh).toBeGreaterThan(0);
  });

  it("shows a loop of an unusable concentration its covered time and the reason, and no energy", async () => {
    const { engineer, pointId } = await meteredPoint(
      { fromMs: Date.UTC(2026, 0, 12), count: 1441, stepMs: MINUTE_MS },
      { zone: "UTC", fluidKind: "propyleneGlycol", glycolVolumePercent: 61 },
    );
    const answer = await engineer
      .get(`/points/${pointId}/summary?from=2026-01-12&to=2026-01-13`)
      .expect(200);
    const summary: PointSummary = answer.body;
    expect(summary.basis).toMatchObject({ blockedBy: "concentration", liquidC: null });
    expect(summary.totals.coverage).toBe(1);
    expect(summary.totals.cooling.energyKwh).toBeNull();
    expect(summary.busiest).toBeNull();
    const marks = await engineer.get(`/points/${pointId}/days?from=2026-01-11&to=2026-01-13`);
    expect(marks.body.days.map((day: { kind: string }) => day.kind)).toEqual(["none", "measured"]);
  });
});

describe("getSeries", () => {
  it("sends at most a column for every two pixels and keeps the peak between the means", async () => {
    const { engineer, pointId } = await meteredPoint(
      {
        fromMs: Date.UTC(2026, 0, 12),
        count: 7 * 1440,
        stepMs: MINUTE_MS,
        return: (row) => (row === 5000 ? 42 : 12.8),
      },
      { zone: "UTC" },
    );
    const answer = await engineer
      .get(`/points/${pointId}/series?from=2026-01-12&to=2026-01-19&pixels=704`)
      .expect(200);
    const series: SeriesAnswer = answer.body;
    expect(series.averagedOverS).toBe(1800);
    expect(unpackNumbers(series.supplyC)).toHaveLength(336);
    expect(Math.max(...unpackNumbers(series.returnC))).toBeLessThan(14);
    expect(series.yExtent.temperatureC).toEqual([6.9, 42]);
    expect(unpackNumbers(series.powerKw)[3]).toBeCloseTo(-steadyKw, 0);
    expect(series.rows).toBe(7 * 1440);
  });

  it("sends rows as they are once the range is short enough", async () => {
    const fromMs = Date.UTC(2026, 0, 12);
    const { engineer, pointId } = await meteredPoint({ fromMs, count: 120, stepMs: MINUTE_MS });
    const answer = await engineer
      .get(`/points/${pointId}/series?from=2026-01-12T00:00:00Z&to=2026-01-12T01:00:00Z&pixels=800`)
      .expect(200);
    const series: SeriesAnswer = answer.body;
    expect(series.averagedOverS).toBeNull();
    expect(series.tMs && unpackNumbers(series.tMs)[1]).toBe(MINUTE_MS);
    expect(unpackNumbers(series.powerKw)[1]).toBeCloseTo(-steadyKw, 0);
  });
});

describe("getReadings", () => {
  it("pages through gaps without losing or repeating a row", async () => {
    const { engineer, pointId } = await meteredPoint({
      fromMs: Date.UTC(2026, 0, 1),
      count: 20 * 1440,
      stepMs: MINUTE_MS,
      without: (row) => row > 100 && row < 18 * 1440,
    });
    const seen: string[] = [];
    let cursor = "";
    do {
      const answer = await engineer
        .get(`/points/${pointId}/readings?from=2026-01-01&to=2026-02-01&limit=1000${cursor}`)
        .expect(200);
      seen.push(...answer.body.items.map((row: { at: string }) => row.at));
      cursor = answer.body.nextCursor === null ? "" : `&cursor=${answer.body.nextCursor}`;
    } while (cursor !== "");
    expect(seen).toHaveLength(101 + 2 * 1440);
    expect(new Set(seen).size).toBe(seen.length);
    expect([...seen].sort()).toEqual(seen);
  });
});

describe("downloads", () => {
  it("write energy with both times, units in the header and no formula from a tag", async () => {
    const { engineer, pointId } = await meteredPoint(
      { fromMs: Date.UTC(2026, 5, 1), count: 1441, stepMs: MINUTE_MS, supply: () => 20 },
      { zone: "Europe/London", tag: "=HYPERLINK(1)", service: "changeover" },
    );
    const answer = await engineer
      .get(
        `/points/${pointId}/energy.csv?from=2026-06-01T00:00:00Z&to=2026-06-01T01:00:00Z&step=quarterHour`,
      )
      .expect(200);
    expect(answer.headers["content-type"]).toContain("text/csv");
    expect(answer.headers["content-disposition"]).toMatch(/HYPERLINK-1.*2026-06-01.*\.csv/);
    const lines = answer.text.replace("\uFEFF", "").split("\r\n");
    expect(lines).toHaveLength(6);
    expect(lines[0]).toContain("Heating (kWh),Cooling (kWh),Volume (m3)");
    const cells = (lines[1] ?? "").split(",");
    expect(cells[0]).toBe("'=HYPERLINK(1)");
    expect(cells.slice(2, 5)).toEqual(["2026-06-01T00:00:00Z", "2026-06-01T01:00:00+01:00", "900"]);
    expect(Number(cells[6])).toBeGreaterThan(0);
  });

  it("leave a negative power a number in the readings, and an empty cell where none was read", async () => {
    const { engineer, pointId } = await meteredPoint(
      {
        fromMs: Date.UTC(2026, 5, 1),
        count: 3,
        stepMs: MINUTE_MS,
        flow: (row) => (row === 1 ? NaN : 28.8),
        quality: (row) => (row === 1 ? RowQuality.noReading : RowQuality.measured),
      },
      { zone: "UTC" },
    );
    const answer = await engineer
      .get(`/points/${pointId}/readings.csv?from=2026-06-01&to=2026-06-02`)
      .expect(200);
    const [, first, second] = answer.text.split("\r\n");
    expect(first).toMatch(/,28\.8,6\.9,12\.8,,-197\.79\d+,measured,,,$/);
    expect(second).toMatch(/,,6\.9,12\.8,,,no reading,,,$/);
  });
});
