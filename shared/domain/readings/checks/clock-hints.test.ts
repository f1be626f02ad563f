import { cleanSeries } from "@test/generators/clean-series";
import { HOUR_MS, MINUTE_MS } from "../../time/interval";
import type { ReadingSegment } from "../reading-columns";
import { clockHint, clockLag } from "./clock-hints";

/** The same series with temperatures written some rows later than they were. */
function late(series: ReadingSegment, rows: number): ReadingSegment {
  const shift = (values: Float64Array) => values.map((_, row) => values[row - rows] ?? NaN);
  const { supplyC, returnC } = series.columns;
  return {
    ...series,
    columns: { ...series.columns, supplyC: shift(supplyC!), returnC: shift(returnC!) },
  };
}

it("sees that temperatures come an hour after the flow that moves them, either way", () => {
  const series = cleanSeries({ rows: 288 * 10, stepMs: 5 * MINUTE_MS });
  expect(clockHint(series)).toBeNull();
  const finding = clockHint(late(series, 12))!;
  expect(finding).toMatchObject({
    code: "clockHint",
    weight: "note",
    choices: [{ change: "keep" }],
  });
  expect(Math.abs(finding.figures.lagMinutes - 60)).toBeLessThanOrEqual(5);
  expect(Math.abs(clockHint(late(series, -12))!.figures.lagMinutes + 60)).toBeLessThanOrEqual(5);
});

it("says nothing of a lag that a pipe may have", () => {
  const series = cleanSeries({ rows: 288 * 10, stepMs: 5 * MINUTE_MS });
  expect(clockHint(late(series, 2))).toBeNull();
});

it("reads two loggers with other steps", () => {
  const { columns } = cleanSeries({ rows: 1440 * 8, stepMs: MINUTE_MS });
  const every5 = Uint32Array.from({ length: columns.instantMs.length / 5 }, (_, i) => i * 5);
  const lag = clockLag(
    { instantMs: columns.instantMs, values: columns.flowM3PerHour! },
    {
      instantMs: Float64Array.from(every5, (row) => columns.instantMs[row]! - HOUR_MS),
      values: Float64Array.from(every5, (row) => columns.supplyC![row]!),
    },
  )!;
  expect(Math.abs(lag.lagMs + HOUR_MS)).toBeLessThanOrEqual(5 * MINUTE_MS);
  expect(lag.agreeing).toBeGreaterThan(0.6);
});

it("needs edges that agree", () => {
  const { columns } = cleanSeries({ rows: 96 * 10 });
  const flow = { instantMs: columns.instantMs, values: columns.flowM3PerHour! };
  const noise = columns.supplyC!.map((_, row) => 7 + ((row * 7919) % 13) / 100);
  expect(clockLag(flow, { ...flow, values: noise })).toBeNull();
  const steady = flow.values.map(() => 31);
  expect(clockLag({ ...flow, values: steady }, { ...flow, values: columns.supplyC! })).toBeNull();
});
