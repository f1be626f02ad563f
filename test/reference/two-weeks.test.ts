import { integrateEnergy } from "@shared/domain/energy/integrate";
import { NO_CUT_OFFS } from "@shared/domain/energy/power";
import { completeness, deltaTMeans, sumIntervals, totalEnergy } from "@shared/domain/energy/totals";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { resolveSegments } from "@shared/domain/readings/resolve-segments";
import { localDaysBetween, weekRange } from "@shared/domain/time/local-calendar";
import { readJson, relativeError } from "./read-csv";
import { readingsOf } from "./scenario-readings";

// Recomputed from the readings alone by a second program with another IF97 library; 0.05 %.
const expected = readJson("test/fixtures/scenarios/S07/expected.json") as Record<
  "week_A" | "week_B",
  Record<string, number>
>;

describe.each([
  ["week_A", 23],
  ["week_B", 24],
] as const)("hourly means of %s", (name, week) => {
  const columns = readingsOf(`test/fixtures/scenarios/S07/${name}.csv`, "interval_start_utc");
  const segments = resolveSegments([
    { precedence: 0, kind: "meanFromLabel", nominalStepMs: null, columns },
  ]);
  const intervals = integrateEnergy(segments, {
    fluid: waterAtPressure(1.6),
    meterSide: "return",
    service: "cooling",
    cutOffs: NO_CUT_OFFS,
  });
  const totals = totalEnergy(intervals);
  const means = deltaTMeans(totals.cooling);
  const range = weekRange({ isoYear: 2025, week }, "UTC");

  test("give the energy, the volume and all three temperature differences", () => {
    for (const [own, key] of [
      [totals.cooling.energyKwh, "energy_kWh"],
      [totals.volumeM3, "volume_m3"],
      [means.flowWeightedK, "flow_weighted_dT_K"],
      [means.energyWeightedK, "energy_weighted_dT_K"],
      [means.timeMeanK, "simple_mean_dT_K"],
    ] as const) {
      expect(relativeError(own ?? NaN, expected[name][key]!)).toBeLessThan(5e-4);
    }
    expect(totals.heating.energyKwh).toBe(0);
  });

  test("cover the whole week, day by day", () => {
    expect(completeness(totals, range)).toBe(1);
    const days = sumIntervals(intervals, localDaysBetween(range, "UTC"));
    expect(days.map((day) => day.coveredS)).toEqual(new Array(7).fill(86_400));
    const sum = days.reduce((kwh, day) => kwh + day.cooling.energyKwh, 0);
    expect(sum).toBeCloseTo(totals.cooling.energyKwh, 6);
  });
});
