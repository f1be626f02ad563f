import { cleanSeries, shortSeries, withoutRows, withValues } from "@test/generators/clean-series";
import { MINUTE_MS } from "../../time/interval";
import { stepChanges } from "./step-change";

const limits = { boreMm: 102.26 };
const tenO = 96 + 40;
const jitter = (row: number) => 0.02 * ((row * 7) % 5);

it("finds a return that sits 1.1 K higher from one reading on, and proposes to split there", () => {
  const rows = Array.from({ length: 96 * 3 }, (_, row) => row);
  const series = shortSeries({
    flow: rows.map((row) => 31 + jitter(row)),
    supply: rows.map((row) => 7 + jitter(row + 2)),
    return: rows.map((row) => (row < tenO ? 12.8 : 13.9) + jitter(row + 1)),
  });
  const [finding, ...others] = stepChanges(series, limits);
  expect(others).toEqual([]);
  const atMs = series.columns.instantMs[tenO]!;
  expect(finding).toMatchObject({
    code: "stepChange",
    weight: "look",
    channel: "returnC",
    rows: [{ from: tenO, to: tenO + 1 }],
    choices: [{ change: "split", atMs }, { change: "keep" }],
  });
  expect(finding!.figures.step).toBeCloseTo(1.1, 9);
  expect(finding!.figures).toMatchObject({ atMs, comparedHours: 24, agreeingPercent: 100 });
});

it("finds a flow that reads a third more, by ratio, where a setting was changed", () => {
  const at = 96 * 2 + 48;
  const series = withValues(cleanSeries({ rows: 96 * 5 }), "flowM3PerHour", (value, row) =>
    row >= at ? value * 1.33 : value,
  );
  const found = stepChanges(series, limits);
  expect(found).toMatchObject([{ channel: "flowM3PerHour", rows: [{ from: at, to: at + 1 }] }]);
  expect(Math.abs(found[0]!.figures.step - 33)).toBeLessThan(6);
});

it("leaves a flow alone whose temperatures answer", () => {
  const at = 96 * 2 + 48;
  const clean = cleanSeries({ rows: 96 * 5 });
  const { supplyC, returnC } = clean.columns;
  const answered = withValues(
    withValues(clean, "flowM3PerHour", (value, row) => (row >= at ? value * 1.33 : value)),
    "returnC",
    (value, row) => (row >= at ? supplyC![row]! + (returnC![row]! - supplyC![row]!) / 1.33 : value),
  );
  expect(stepChanges(answered, limits)).toEqual([]);
});

it("leaves a set-back alone that comes back the next day", () => {
  const clean = cleanSeries({ rows: 96 * 5, service: "heating", runsAllNight: true });
  const setBack = withValues(clean, "supplyC", (value, row) => {
    const hour = (row % 96) / 4;
    return hour < 5 || hour >= 22 ? value - 9 : value;
  });
  expect(stepChanges(setBack, limits)).toEqual([]);
});

it("finds the step over the gap that strapping on again leaves", () => {
  const at = 96 * 2 + 45;
  const moved = withValues(cleanSeries({ rows: 96 * 5 }), "returnC", (value, row) =>
    row >= at ? value + 1.5 : value,
  );
  const series = withoutRows(moved, (row) => row >= at - 4 && row < at);
  expect(stepChanges(series, limits).map(({ rows }) => rows)).toEqual([
    [{ from: at - 4, to: at - 3 }],
  ]);
});

it("judges a temperature in a short visit, and no flow, which jumps with the load", () => {
  const rows = Array.from({ length: 240 }, (_, row) => row);
  const step = (row: number, size: number) => (row < 120 ? 0 : size);
  const series = (onFlow: number, onSupply: number) =>
    shortSeries(
      {
        flow: rows.map((row) => 31 + jitter(row) + step(row, onFlow)),
        supply: rows.map((row) => 7 + jitter(row + 2) + step(row, onSupply)),
        return: rows.map((row) => 12.8 + jitter(row + 1)),
      },
      MINUTE_MS,
    );
  expect(stepChanges(series(0, 0.8), limits)).toMatchObject([
    {
      channel: "supplyC",
      rows: [{ from: 120, to: 121 }],
      figures: { comparedHours: expect.closeTo(2, 1) as number },
    },
  ]);
  expect(stepChanges(series(12, 0), limits)).toEqual([]);
});

it("takes no clean visit of under two days for one with a step, whatever its weather", () => {
  const found = Array.from({ length: 200 }, (_, seed) => {
    const isMinutes = seed % 2 === 0;
    const series = cleanSeries({
      seed: 7919 * seed + 1,
      stepMs: (isMinutes ? 1 : 5) * MINUTE_MS,
      rows: (isMinutes ? 5 : 1) * (300 + ((seed * 37) % 276)),
      service: seed % 3 === 0 ? "heating" : "cooling",
      runsAllNight: seed % 4 < 2,
    });
    return stepChanges(series, limits).length;
  });
  expect(found.filter((count) => count > 0)).toEqual([]);
});
