import { baseLoad, lowDeltaT, offHours } from "@shared/domain/analysis/base-load";
import { durationCurve } from "@shared/domain/analysis/duration-curve";
import { excessFlow } from "@shared/domain/analysis/excess-flow";
import { fullLoadHours, loadFactor } from "@shared/domain/analysis/load-factor";
import { loadSteps } from "@shared/domain/analysis/load-steps";
import { ASSUMED_OCCUPIED_HOURS } from "@shared/domain/analysis/occupied-hours";
import { specificFlow } from "@shared/domain/analysis/specific-flow";
import { peakDemand } from "@shared/domain/energy/demand";
import { integrateEnergy } from "@shared/domain/energy/integrate";
import { NO_CUT_OFFS } from "@shared/domain/energy/power";
import { totalEnergy } from "@shared/domain/energy/totals";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { resolveSegments } from "@shared/domain/readings/resolve-segments";
import { HOUR_MS } from "@shared/domain/time/interval";
import { readJson, relativeError } from "./read-csv";
import { readingsOf } from "./scenario-readings";

// Recomputed from the readings alone by a second program with another IF97 library.
const expected = readJson("test/fixtures/scenarios/S07/expected.json") as Record<
  "week_A" | "week_B",
  Record<string, number>
> &
  Record<"pump_kWh_per_MWh_A" | "pump_kWh_per_MWh_B" | "ratio_volume_per_kWh", number>;
const utc = (ms: number) => ms;
const water = waterAtPressure(1.6);
const pump = { staticHeadM: 8, designHeadM: 26, designFlowM3PerHour: 130, efficiency: 0.58 };
const pricePerKwh = 0.187;

function weekOf(name: "week_A" | "week_B") {
  const columns = readingsOf(`test/fixtures/scenarios/S07/${name}.csv`, "interval_start_utc");
  const segments = resolveSegments([
    { precedence: 0, kind: "meanFromLabel", nominalStepMs: null, columns },
  ]);
  const intervals = integrateEnergy(segments, {
    fluid: water,
    meterSide: "return",
    service: "cooling",
    cutOffs: NO_CUT_OFFS,
  });
  const totals = totalEnergy(intervals);
  const steps = loadSteps(intervals, { register: "cooling", volume: "all", stepMs: HOUR_MS });
  const excess = excessFlow(steps, {
    fluid: water,
    register: "cooling",
    meterSide: "return",
    designDeltaTK: 6,
    minimumFlowM3PerHour: 20,
    pump,
  });
  return { totals, steps, excess };
}

describe.each([
  ["week_A", "pump_kWh_per_MWh_A"],
  ["week_B", "pump_kWh_per_MWh_B"],
] as const)("the shape of %s", (name, perMwh) => {
  const { totals, steps, excess } = weekOf(name);
  const { energyKwh } = totals.cooling;
  const peak = peakDemand(steps, { kind: "fixed", windowMinutes: 60 });
  const flow = specificFlow(totals.volumeM3, energyKwh);
  const off = offHours(steps, ASSUMED_OCCUPIED_HOURS, utc);

  test.each([
    ["peak_kW", peak?.powerKw],
    ["load_factor", loadFactor(energyKwh, totals.coveredS, peak)?.value],
    ["EFLH_h", fullLoadHours(energyKwh, peak?.powerKw ?? null)],
    ["L_s_per_kW", flow?.litresPerSecondPerKw],
    ["gpm_per_ton", flow?.gpmPerTon],
    ["ideal_volume_m3", excess?.idealVolumeM3],
    ["excess_volume_pct", (excess?.excessShare ?? NaN) * 100],
    ["pump_kWh", excess?.pump?.energyKwh],
    ["pump_at_ideal_kWh", excess?.pump?.idealEnergyKwh],
    ["pump_excess_kWh", excess?.pump?.excessKwh],
    ["pump_excess_cost", (excess?.pump?.excessKwh ?? NaN) * pricePerKwh],
    ["off_hours_energy_share_pct", (off.energyShare ?? NaN) * 100],
  ] as const)("has the %s of the second program", (key, own) => {
    expect(relativeError(own ?? NaN, expected[name][key]!)).toBeLessThan(5e-4);
  });

  test("has its base load, hours of low difference and pumping for each MWh", () => {
    const base = baseLoad(steps, "all", ASSUMED_OCCUPIED_HOURS, utc);
    expect(relativeError(base?.powerKw ?? NaN, expected[name]["base_load_p5_kW"]!)).toBeLessThan(
      5e-3,
    );
    expect((lowDeltaT(steps, 4, 0)?.seconds ?? NaN) / 3600).toBe(
      expected[name]["hours_dT_below_4K"],
    );
    const kwhPerMwh = (excess?.pump?.energyKwh ?? NaN) / (energyKwh / 1000);
    expect(relativeError(kwhPerMwh, expected[perMwh])).toBeLessThan(5e-4);
  });

  test("runs down its curve from the peak over all covered hours, and keeps the energy", () => {
    const curve = durationCurve(steps);
    expect(curve[0]).toEqual({ hours: 0, powerKw: peak?.powerKw });
    expect(curve.at(-1)?.hours).toBe(168);
    const area = curve
      .slice(1)
      .reduce((kwh, point, i) => kwh + point.powerKw * (point.hours - curve[i]!.hours), 0);
    expect(area).toBeCloseTo(energyKwh, 6);
  });
});

test("the two weeks compare as the second program says", () => {
  const [a, b] = (["week_A", "week_B"] as const).map((name) => {
    const { totals } = weekOf(name);
    return specificFlow(totals.volumeM3, totals.cooling.energyKwh)?.m3PerKwh ?? NaN;
  });
  expect(relativeError(b! / a!, expected.ratio_volume_per_kWh)).toBeLessThan(5e-4);
});
