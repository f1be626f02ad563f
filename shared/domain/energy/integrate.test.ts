import { waterAtPressure } from "../fluids/water-at-pressure";
import { RowQuality, type ReadingSegment, type SeriesKind } from "../readings/reading-columns";
import { integrateEnergy, type IntegrationOptions } from "./integrate";
import { NO_CUT_OFFS, samplePower, thermalPowerKw } from "./power";
import { totalEnergy } from "./totals";
import { rowsOutsideFluid } from "./fluid-range";

const T0 = Date.UTC(2026, 4, 14);
const minute = 60_000;
const water = waterAtPressure(1.6);
const options: IntegrationOptions = {
  fluid: water,
  meterSide: "return",
  service: "cooling",
  cutOffs: NO_CUT_OFFS,
};

/** `[minute, flow, supply, return, quality?]` rows. */
function segment(
  rows: readonly (readonly number[])[],
  nominalMinutes: number,
  kind: SeriesKind = "instantaneous",
): ReadingSegment {
  const column = (index: number) => Float64Array.from(rows, (row) => row[index]!);
  return {
    kind,
    nominalStepMs: nominalMinutes * minute,
    columns: {
      instantMs: column(0).map((m) => T0 + m * minute),
      flowM3PerHour: column(1),
      supplyC: column(2),
      returnC: column(3),
      signalPercent: null,
      quality: Uint8Array.from(rows, (row) => row[4] ?? RowQuality.measured),
    },
  };
}
const steady = (minutes: number[], nominal: number, kind?: SeriesKind) =>
  segment(
    minutes.map((m) => [m, 28.8, 6.9, 12.8]),
    nominal,
    kind,
  );
const power = -thermalPowerKw(28.8, 6.9, 12.8, water, "return");
const coveredMinutes = (segments: ReadingSegment[]) =>
  totalEnergy(integrateEnergy(segments, options)).coveredS / 60;

test("a trapezoid joins neighbours and a long step stays a hole", () => {
  const { cooling, coveredS } = totalEnergy(
    integrateEnergy([steady([0, 1, 2, 5, 9, 10], 1)], options),
  );
  expect(coveredS).toBe(6 * 60);
  expect(cooling.energyKwh).toBeCloseTo(power * 0.1, 9);
});

test("a mean covers up to the next label, or one step before a hole and at the end", () => {
  expect(coveredMinutes([steady([0, 5, 15, 60], 5, "meanFromLabel")])).toBe(5 + 10 + 5 + 5);
  expect(coveredMinutes([steady([0, 5, 15, 60], 5, "meanToLabel")])).toBe(5 + 5 + 10 + 5);
});

test("a mean labelled at its end belongs to the time before the label", () => {
  const from = integrateEnergy([steady([0, 15], 15, "meanFromLabel")], options);
  const to = integrateEnergy([steady([15, 30], 15, "meanToLabel")], options);
  expect(to.startMs.slice(0, 2)).toEqual(from.startMs);
  expect(to.cooling.energyKwh.slice(0, 2)).toEqual(from.cooling.energyKwh);
});

test("an excluded row and a row without a reading cover nothing and are not bridged", () => {
  for (const quality of [RowQuality.excluded, RowQuality.noReading]) {
    const rows = [0, 1, 2, 3, 4].map((m) => [m, 28.8, 6.9, 12.8, m === 2 ? quality : 0]);
    const columns = integrateEnergy([segment(rows, 1)], options);
    expect(columns.coveredS[0]).toBe(120);
    expect(columns.measuredRows[0]).toBe(4);
    const counted = quality === RowQuality.excluded ? columns.excludedRows : columns.noReadingRows;
    expect(counted[0]).toBe(1);
  }
});

test("a step over an interval's boundary is split by time and says so", () => {
  const columns = integrateEnergy([steady([10, 20, 40], 10)], options);
  expect([...columns.coveredS]).toEqual([300, 900, 600]);
  expect([...columns.apportioned]).toEqual([1, 1, 1]);
  const aligned = integrateEnergy([steady([0, 15, 30], 15)], options);
  expect([...aligned.apportioned]).toEqual([0, 0, 0]);
  expect(aligned.coveredS[0]).toBe(900);
});

test("power of the other sign lands in its own register, on a one-service loop too", () => {
  const rows = [
    [0, 10, 6, 12],
    [5, 10, 12, 6],
    [10, 10, 12, 6],
  ];
  const totals = totalEnergy(integrateEnergy([segment(rows, 5, "meanFromLabel")], options));
  expect(totals.cooling.runningS).toBe(300);
  expect(totals.heating.runningS).toBe(600);
  expect(totals.heating.energyKwh).toBeCloseTo(
    (thermalPowerKw(10, 12, 6, water, "return") * 10) / 60,
    9,
  );
});

test("a crossing between two samples fills both registers", () => {
  const crossing = segment(
    [
      [0, 10, 6, 12],
      [5, 10, 12, 6],
    ],
    5,
  );
  const totals = totalEnergy(integrateEnergy([crossing], { ...options, service: "changeover" }));
  expect(totals.cooling.energyKwh).toBeGreaterThan(0);
  expect(totals.heating.energyKwh).toBeGreaterThan(0);
});

test("a sample below a cut-off is suppressed and shown, one exactly at it counts", () => {
  const rows = [
    [0, 10, 6, 12],
    [5, 0.4, 6, 12],
    [10, 10, 31.8, 32.3],
    [15, 10, 6, 6.49],
  ];
  const cutOffs = { flowM3PerHour: 0.5, deltaTK: 0.5 };
  const columns = integrateEnergy([segment(rows, 5, "meanFromLabel")], { ...options, cutOffs });
  const totals = totalEnergy(columns);
  expect(totals.suppressedS).toBe(600);
  expect(totals.cooling.runningS).toBe(600);
  expect(totals.suppressedKwh).toBeGreaterThan(0);
  expect(totals.volumeM3).toBeCloseTo((30.4 * 5) / 60, 9);
  expect(totals.maxPowerKw).toBe(0);
});

test("flow without a temperature difference counts as volume of the loop's own service", () => {
  const rows = [
    [0, 10, 6, 6],
    [5, 10, 6, 6],
  ];
  const totals = totalEnergy(integrateEnergy([segment(rows, 5, "meanFromLabel")], options));
  expect(totals.cooling.volumeM3).toBeCloseTo(10 / 6, 9);
  expect(totals.heating.volumeM3).toBe(0);
});

test("temperatures water cannot have carry no energy and are reported", () => {
  const rows = [
    [0, 10, 6, 12],
    [1, 10, -4, 12],
    [2, 10, 6, 160],
    [3, 10, 6, 12],
    [4, 10, 6, 12],
  ];
  const bad = segment(rows, 1);
  const columns = integrateEnergy([bad], options);
  expect(columns.coveredS[0]).toBe(60);
  expect(columns.noReadingRows[0]).toBe(2);
  expect(rowsOutsideFluid(bad.columns, water)).toMatchObject({
    count: 2,
    examples: [
      { instantMs: T0 + minute, channel: "supply", problem: { code: "belowFreezing", value: -4 } },
      { channel: "return", problem: { code: "aboveRange", value: 160 } },
    ],
  });
});

test("neighbouring segments join where the coarser step allows it, and never overlap", () => {
  const quarter = steady([0, 15], 15);
  const minutes = steady([27, 28, 29], 1);
  expect(coveredMinutes([quarter, minutes])).toBe(29);
  const means = steady([0, 15], 15, "meanFromLabel");
  expect(coveredMinutes([minutes, means])).toBe(27 + 2);
  expect(() => integrateEnergy([steady([0, 20], 15), steady([10, 30], 15)], options)).toThrow(
    "overlap",
  );
});

test("means labelled at their end do not reach back over means labelled at their start", () => {
  const from = steady([0, 15], 15, "meanFromLabel");
  const to = steady([25, 35], 10, "meanToLabel");
  expect(coveredMinutes([from, to])).toBe(35);
});

test("temperatures within the same hundredth keep their own power", () => {
  const rows = [
    [0, 10, 6.001, 12.004],
    [1, 10, 6.004, 12.001],
    [2, 10, 6.001, 12.004],
  ];
  const { powerKw } = samplePower(segment(rows, 1).columns, options);
  expect([...powerKw]).toEqual(
    rows.map(([, flow, supply, back]) => thermalPowerKw(flow!, supply!, back!, water, "return")),
  );
});

test("extremes are those of the rows whose steps reach into the interval", () => {
  const rows = [
    [0, 10, 6, 12],
    [15, 20, 6, 12],
    [30, 30, 6, 12],
  ];
  const columns = integrateEnergy([segment(rows, 15)], options);
  expect([...columns.minFlowM3PerHour]).toEqual([10, 20, NaN]);
  expect([...columns.maxFlowM3PerHour]).toEqual([20, 30, NaN]);
  expect(columns.minPowerKw[0]).toBeCloseTo(thermalPowerKw(20, 6, 12, water, "return"), 9);
});
