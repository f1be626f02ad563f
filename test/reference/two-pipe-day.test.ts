import { integrateEnergy } from "@shared/domain/energy/integrate";
import { countCutOffs, NO_CUT_OFFS, type PowerOptions } from "@shared/domain/energy/power";
import { totalEnergy } from "@shared/domain/energy/totals";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { resolveSegments } from "@shared/domain/readings/resolve-segments";
import { readJson, relativeError } from "./read-csv";
import { readingsOf } from "./scenario-readings";

// Recomputed from the readings alone by a second program with another IF97 library; 0.05 %.
const expected = readJson("test/fixtures/scenarios/S10/expected.json") as Record<string, number>;
const TOLERANCE = 5e-4;

const columns = readingsOf("test/fixtures/scenarios/S10/two_pipe.csv", "time_utc");
const segments = resolveSegments([
  { precedence: 0, kind: "instantaneous", nominalStepMs: null, columns },
]);
const withoutCutOffs: PowerOptions = {
  fluid: waterAtPressure(1.6),
  meterSide: "supply",
  service: "changeover",
  cutOffs: NO_CUT_OFFS,
};
const withCutOffs = { ...withoutCutOffs, cutOffs: { flowM3PerHour: 0.5, deltaTK: 0.5 } };

test("a two-pipe changeover day fills both registers and shows what the cut-offs hold back", () => {
  const totals = totalEnergy(integrateEnergy(segments, withCutOffs));
  expect(relativeError(totals.heating.energyKwh, expected.heating_kWh!)).toBeLessThan(TOLERANCE);
  expect(relativeError(totals.cooling.energyKwh, expected.cooling_kWh!)).toBeLessThan(TOLERANCE);
  expect(relativeError(totals.suppressedKwh, expected.suppressed_abs_kWh!)).toBeLessThan(TOLERANCE);
  expect(relativeError(totals.volumeM3, expected.volume_m3!)).toBeLessThan(TOLERANCE);
  // 77 kWh would be the difference of the two.
  expect(Math.abs(totals.heating.energyKwh - expected.net_kWh_wrong!)).toBeGreaterThan(1000);
});

test("11 samples are below the flow cut-off and 6 more below the temperature's alone", () => {
  expect(countCutOffs(columns, withCutOffs)).toEqual({
    belowFlow: expected.samples_below_flow_cutoff,
    belowDeltaTOnly: expected.samples_below_dT_min_only,
  });
});

test("without cut-offs every sample counts", () => {
  const totals = totalEnergy(integrateEnergy(segments, withoutCutOffs));
  const { no_cutoff_heating_kWh: heating, no_cutoff_cooling_kWh: cooling } = expected;
  expect(relativeError(totals.heating.energyKwh, heating!)).toBeLessThan(TOLERANCE);
  expect(relativeError(totals.cooling.energyKwh, cooling!)).toBeLessThan(TOLERANCE);
  expect(totals.suppressedKwh).toBe(0);
});
