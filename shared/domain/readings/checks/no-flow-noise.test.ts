import { shortSeries } from "@test/generators/clean-series";
import { noFlowBelowM3PerHour } from "./no-flow";
import { noFlowNoise } from "./no-flow-noise";

const limits = { boreMm: 102.26, flowCutOffM3PerHour: null };

it("puts the zero uncertainty to this bore", () => {
  expect(noFlowBelowM3PerHour({ boreMm: 102.26 })).toBeCloseTo(0.295668, 6);
  expect(noFlowBelowM3PerHour({ boreMm: 102.26, zeroUncertaintyMPerS: 0.002 })).toBeCloseTo(
    0.0591336,
    6,
  );
  expect(noFlowBelowM3PerHour({ boreMm: null })).toBe(0);
});

it("finds flow that cannot be told from none, with what it would have moved", () => {
  const series = shortSeries({ flow: [31, 0.12, -0.2, 0, 0.12, 0.296, 31] });
  const finding = noFlowNoise(series, limits)!;
  expect(finding.rows).toEqual([
    { from: 1, to: 3 },
    { from: 4, to: 5 },
  ]);
  expect(finding.figures.hours).toBeCloseTo(0.75, 12);
  expect(finding.figures.volumeM3).toBeCloseTo(0.01, 12);
  expect(finding.choices).toEqual([
    { change: "cutOff", flowM3PerHour: noFlowBelowM3PerHour(limits) },
    { change: "keep" },
  ]);
});

it("says nothing of what the loop's cut-off takes already, or without a bore", () => {
  const series = shortSeries({ flow: [31, 0.12, 31] });
  expect(noFlowNoise(series, { ...limits, flowCutOffM3PerHour: 0.3 })).toBeNull();
  expect(noFlowNoise(series, { ...limits, flowCutOffM3PerHour: 0.1 })!.rowCount).toBe(1);
  expect(noFlowNoise(series, { ...limits, boreMm: null })).toBeNull();
});
