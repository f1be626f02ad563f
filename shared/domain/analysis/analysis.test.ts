import { readCsv, readJson, relativeError } from "@test/reference/read-csv";
import { intervalColumns } from "@test/reference/interval-columns";
import { peakDemand } from "../energy/demand";
import { waterAtPressure } from "../fluids/water-at-pressure";
import { HOUR_MS } from "../time/interval";
import { localDay } from "../time/local-calendar";
import { zoneOffsets } from "../time/zone-offsets";
import { baseLoad, lowDeltaT, offHours, percentile } from "./base-load";
import { durationCurve, thinnedCurve } from "./duration-curve";
import { excessFlow, flowAtDesignM3PerHour } from "./excess-flow";
import { fullLoadHours, loadFactor } from "./load-factor";
import { loadStepMs, loadSteps, type LoadSteps } from "./load-steps";
import { ASSUMED_OCCUPIED_HOURS, isOccupied } from "./occupied-hours";
import { cubeLawPowerKw, pumpPowerKw, systemHeadM } from "./pump-power";
import { specificFlow } from "./specific-flow";

// A Monday.
const T0 = Date.UTC(2026, 4, 11);
const utc = (ms: number) => ms;

function hours(powerKw: readonly number[], flow: readonly number[] = []): LoadSteps {
  const of = (value: (kw: number, i: number) => number) => Float64Array.from(powerKw, value);
  return {
    stepMs: HOUR_MS,
    startMs: of((_, i) => T0 + i * HOUR_MS),
    coveredS: of(() => 3600),
    energyKwh: of((kw) => kw),
    volumeM3: of((_, i) => flow[i] ?? 10),
    supplyC: of(() => 6),
    returnC: of(() => 12),
  };
}

describe("demand and load factor on the days clocks change", () => {
  // Recomputed from the readings alone by a second program; 0.01 %.
  const expected = readJson("test/fixtures/scenarios/S06/expected.json") as Record<
    string,
    Record<string, number | string>
  >;
  it.each([
    ["autumn", "2025-10-26", "autumn_2025_10_26"],
    ["spring", "2026-03-29", "spring_2026_03_29"],
  ])("the %s day has its peaks and names the one its load factor stands on", (name, date, key) => {
    const day = expected[key]!;
    const powers = readCsv(`test/fixtures/scenarios/S06/${name}.csv`, ";").map((row) =>
      Number((row["mean_kW"] ?? "").replace(",", ".")),
    );
    const { startMs } = localDay(date, "Europe/Paris");
    const offsets = zoneOffsets("Europe/Paris");
    const steps = loadSteps(intervalColumns(startMs, powers), {
      register: "cooling",
      volume: "all",
      stepMs: loadStepMs(900_000),
    });
    const peak = (kind: "fixed" | "rolling", windowMinutes: number) =>
      peakDemand(steps, { kind, windowMinutes }, (ms) => offsets.offsetAt(ms));
    const energyKwh = steps.energyKwh.reduce((sum, kwh) => sum + kwh, 0);
    const rolling = peak("rolling", 60);
    const factor = loadFactor(energyKwh, powers.length * 900, rolling);
    for (const [own, name] of [
      [energyKwh, "energy_kWh"],
      [peak("fixed", 15)?.powerKw, "peak15_kW"],
      [peak("fixed", 30)?.powerKw, "peak30_fixed_kW"],
      [peak("fixed", 60)?.powerKw, "peak60_fixed_kW"],
      [rolling?.powerKw, "peak60_rolling_kW"],
      [factor?.meanKw, "mean_kW"],
      [factor?.value, "load_factor_on_rolling"],
    ] as const)
      expect([name, relativeError(own ?? NaN, Number(day[name])) < 1e-4]).toEqual([name, true]);
    expect(factor?.peak.definition).toEqual({ kind: "rolling", windowMinutes: 60 });
    expect(peak("fixed", 60)?.startMs).toBe(Date.parse(String(day["peak60_fixed_start_utc"])));
    expect(rolling?.startMs).toBe(Date.parse(String(day["peak60_rolling_start_utc"])));
  });

  it("have no load factor without a peak above zero", () => {
    expect(loadFactor(10, 3600, null)).toBeNull();
    const still = peakDemand(hours([0, 0]), { kind: "fixed", windowMinutes: 60 });
    expect(loadFactor(0, 7200, still)).toBeNull();
    expect(fullLoadHours(33812.65, 518.1107)).toBeCloseTo(65.26, 2);
    expect(fullLoadHours(33812.65, null)).toBeNull();
  });
});

describe("loadSteps", () => {
  it("sums quarter-hours to the log's own step by the wall clock, and keeps a hole unknown", () => {
    const columns = intervalColumns(T0, [10, 20, 30, 40, 50]);
    columns.coveredS[4] = 0;
    const options = { register: "cooling", volume: "all", stepMs: loadStepMs(HOUR_MS) } as const;
    const steps = loadSteps(columns, options);
    expect(Array.from(steps.energyKwh)).toEqual([25, 12.5]);
    expect(Array.from(steps.coveredS)).toEqual([3600, 0]);
    expect(steps.supplyC[1]).toBeNaN();
    const india = loadSteps(columns, { ...options, offsetAt: () => 5.5 * HOUR_MS });
    expect(Array.from(india.startMs)).toEqual([T0 - HOUR_MS / 2, T0 + HOUR_MS / 2]);
  });

  it.each([
    [null, 900_000],
    [60_000, 900_000],
    [1_200_000, 1_800_000],
    [HOUR_MS, HOUR_MS],
  ])("a log of %s ms is judged in steps of %s ms", (nominal, step) => {
    expect(loadStepMs(nominal)).toBe(step);
  });
});

describe("durationCurve", () => {
  it("falls from the greatest power at 0 h to the least at all covered hours", () => {
    expect(durationCurve(hours([10, 30, 20]))).toEqual([
      { hours: 0, powerKw: 30 },
      { hours: 1, powerKw: 30 },
      { hours: 2, powerKw: 20 },
      { hours: 3, powerKw: 10 },
    ]);
    const holed = hours([10, 30, 20]);
    holed.coveredS[1] = 0;
    expect(durationCurve(holed).at(-1)).toEqual({ hours: 2, powerKw: 10 });
    expect(durationCurve(hours([]))).toEqual([]);
  });

  it("keeps both ends and a short spike when thinned", () => {
    const year = durationCurve(
      hours(Array.from({ length: 8760 }, (_, i) => (i < 3 ? 900 : i / 100))),
    );
    const thin = thinnedCurve(year, 200);
    expect(thin.length).toBeLessThanOrEqual(200);
    expect(thin.length).toBeGreaterThan(100);
    expect([thin[0], thin.at(-1)]).toEqual([year[0], year.at(-1)]);
    expect(thin).toContainEqual({ hours: 3, powerKw: 900 });
    expect(thin.every((point, i) => i === 0 || point.hours >= thin[i - 1]!.hours)).toBe(true);
    expect(thinnedCurve(year.slice(0, 50), 200)).toHaveLength(50);
  });
});

describe("base load and off hours", () => {
  it("interpolates between order statistics", () => {
    expect(percentile(Float64Array.of(50, 10, 30, 20, 40), 0.05)).toBeCloseTo(12, 12);
    expect(percentile(Float64Array.of(7), 0.05)).toBe(7);
    expect(percentile(new Float64Array(0), 0.05)).toBeNull();
  });

  it("says which hours it is taken over, and leaves out a step hardly covered", () => {
    // 24 h of a Monday: 5 kW at night, 100 kW while people are in.
    const day = hours(Array.from({ length: 24 }, (_, h) => (h >= 7 && h < 19 ? 100 : 5)));
    day.coveredS[0] = 60;
    day.energyKwh[0] = 0;
    expect(baseLoad(day, "unoccupied", ASSUMED_OCCUPIED_HOURS, utc)).toEqual({
      powerKw: 5,
      hours: "unoccupied",
      steps: 11,
      // Rank 0.5 of eleven like steps: the first two.
      between: [
        { startMs: T0 + HOUR_MS, endMs: T0 + 2 * HOUR_MS },
        { startMs: T0 + 2 * HOUR_MS, endMs: T0 + 3 * HOUR_MS },
      ],
    });
    expect(baseLoad(day, "all", ASSUMED_OCCUPIED_HOURS, utc)?.steps).toBe(23);
    const off = offHours(day, ASSUMED_OCCUPIED_HOURS, utc);
    expect(off.energyShare).toBeCloseTo(55 / 1255, 12);
    expect(off.dayOffRatio).toBeNull();
  });

  it("compares days off with working days by mean power", () => {
    const week = hours(Array.from({ length: 168 }, (_, h) => (h < 120 ? 40 : 10)));
    expect(offHours(week, ASSUMED_OCCUPIED_HOURS, utc).dayOffRatio).toBeCloseTo(0.25, 12);
  });

  it.each([
    [7 * 60, true],
    [19 * 60 - 1, true],
    [19 * 60, false],
    [6 * 60 + 59, false],
    [5 * 1440 + 9 * 60, false],
  ])("minute %s of a week from Monday is occupied: %s", (minute, occupied) => {
    expect(isOccupied(T0 + minute * 60_000, ASSUMED_OCCUPIED_HOURS)).toBe(occupied);
  });

  it("lists the stretches in which the pump ran for nothing", () => {
    const steps = hours([5, 0, 0, 5, 0], [10, 10, 10, 10, 0]);
    for (const i of [1, 2, 4]) steps.returnC[i] = 6.4;
    expect(lowDeltaT(steps, 1, 0)).toEqual({
      limitK: 1,
      seconds: 7200,
      runs: [{ startMs: T0 + HOUR_MS, endMs: T0 + 3 * HOUR_MS }],
    });
    expect(lowDeltaT(hours([]), 1, 0)).toBeNull();
  });
});

describe("specific flow", () => {
  // 12/6 °C, meter on the return, 1.6 MPa: k = 4.192330 MJ/(m³K), so 6 K carry 6.98722 kWh/m³.
  it("is 0.0397551 L/s for each kW at 12/6 °C", () => {
    const water = waterAtPressure(1.6);
    const kwhPerM3 = (water.density(12) * (water.enthalpy(12) - water.enthalpy(6))) / 3600;
    expect(specificFlow(1, kwhPerM3)?.litresPerSecondPerKw).toBeCloseTo(0.0397551, 6);
    expect(specificFlow(1, 0)).toBeNull();
  });

  it("is 2.39383 US gpm for each ton at 44/54 °F", () => {
    const water = waterAtPressure(1.6);
    const [cold, warm] = [(44 - 32) / 1.8, (54 - 32) / 1.8];
    const of = (meterC: number) =>
      (water.density(meterC) * (water.enthalpy(warm) - water.enthalpy(cold))) / 3600;
    expect(specificFlow(1, of(warm))?.gpmPerTon).toBeCloseTo(2.39383, 3);
  });
});

describe("excess flow", () => {
  const options = {
    fluid: waterAtPressure(1.6),
    register: "cooling",
    meterSide: "return",
    designDeltaTK: 6,
    minimumFlowM3PerHour: null,
    pump: null,
  } as const;

  it("is measured against the flow the load needs at the design difference", () => {
    expect(flowAtDesignM3PerHour(100, 6, options)).toBeCloseTo(14.312, 3);
    const one = excessFlow(hours([100], [20]), options);
    expect(one?.excessShare).toBeCloseTo(20 / 14.312 - 1, 3);
    expect(one?.pump).toBeNull();
  });

  it("keeps the least flow, and is never negative", () => {
    const least = excessFlow(hours([10], [20]), { ...options, minimumFlowM3PerHour: 16 });
    expect(least?.idealVolumeM3).toBe(16);
    const tight = excessFlow(hours([200], [20]), options);
    expect(tight?.excessShare).toBe(0);
  });

  it("leaves out steps whose design return is no liquid water, and says how long", () => {
    const cold = hours([100, 100], [20, 20]);
    cold.supplyC[0] = 4;
    const heating = { ...options, register: "heating", designDeltaTK: 5 } as const;
    expect(excessFlow(cold, heating)).toMatchObject({ seconds: 3600, leftOutS: 3600 });
    expect(excessFlow(hours([]), options)).toBeNull();
  });
});

describe("pump power", () => {
  const curve = { staticHeadM: 8, designHeadM: 26, designFlowM3PerHour: 130, efficiency: 0.58 };
  it("is ρgqH over the efficiency, with the head of the system at that flow", () => {
    expect(systemHeadM(curve, 0)).toBe(8);
    expect(systemHeadM(curve, 65)).toBe(12.5);
    // By hand: 1000 · 9.80665 · (130 / 3600) · 26 / 1000 / 0.58 kW.
    expect(pumpPowerKw(curve, 130, 1000)).toBeCloseTo(15.8747, 4);
    expect(pumpPowerKw(curve, 0, 1000)).toBe(0);
  });

  it("follows the cube of flow without static head, and refuses the law with it", () => {
    const friction = { ...curve, staticHeadM: 0 };
    expect(cubeLawPowerKw(8, { ...friction, designFlowM3PerHour: 100 }, 50)).toBe(1);
    expect(pumpPowerKw(friction, 65, 1000)).toBeCloseTo(
      cubeLawPowerKw(pumpPowerKw(friction, 130, 1000), friction, 65) ?? NaN,
      12,
    );
    expect(cubeLawPowerKw(8, curve, 65)).toBeNull();
  });
});
