import { shortSeries } from "@test/generators/clean-series";
import { MINUTE_MS } from "../../time/interval";
import { RowQuality } from "../reading-columns";
import { hampelSpikes } from "./hampel-spikes";

const steady = (level: number, rows = 40) =>
  Array.from({ length: rows }, (_, row) => level + 0.02 * ((row * 7) % 5));
const put = (values: readonly number[], at: Readonly<Record<number, number>>) =>
  values.map((value, row) => at[row] ?? value);

it("finds one reading of 310 m³/h among 31 in DN 100, and says its speed", () => {
  const [finding, ...others] = hampelSpikes(shortSeries({ flow: put(steady(31), { 20: 310 }) }), {
    boreMm: 102.26,
  });
  expect(others).toEqual([]);
  expect(finding).toMatchObject({
    code: "spikes",
    channel: "flowM3PerHour",
    rows: [{ from: 20, to: 21 }],
    figures: { spikes: 1, worst: 310, limit: 5 },
  });
  expect(finding!.figures.worstRate).toBeCloseTo(310 / 29.5668, 3);
  expect(finding!.choices.map(({ change }) => change)).toEqual(["exclude", "keep"]);
});

it("leaves a flow that only stands out, or is only fast, alone", () => {
  const standsOut = shortSeries({ flow: put(steady(31), { 20: 90 }) });
  expect(hampelSpikes(standsOut, { boreMm: 102.26 })).toEqual([]);
  expect(hampelSpikes(standsOut, { boreMm: 50 })).toHaveLength(1);
  const fast = shortSeries({ flow: steady(310) });
  expect(hampelSpikes(fast, { boreMm: 102.26 })).toEqual([]);
});

it("does not judge flow in an unknown bore", () => {
  const flow = put(steady(31), { 20: 310 });
  expect(hampelSpikes(shortSeries({ flow }), { boreMm: null })).toEqual([]);
});

it("finds a temperature that jumps there and back, up to seven readings long", () => {
  const supply = steady(7);
  const of = (length: number) =>
    hampelSpikes(
      shortSeries({ supply: supply.map((v, r) => (r >= 15 && r < 15 + length ? v + 78 : v)) }),
      { boreMm: null },
    ).flatMap(({ rows }) => rows);
  expect(of(1)).toEqual([{ from: 15, to: 16 }]);
  expect(of(7)).toEqual([{ from: 15, to: 22 }]);
  expect(of(8)).toEqual([]);
});

it("leaves a step, a slow hump and an end of the series alone", () => {
  const check = (supply: readonly number[]) =>
    hampelSpikes(shortSeries({ supply }, MINUTE_MS), { boreMm: null });
  expect(check(steady(7).map((v, r) => (r >= 20 ? v + 40 : v)))).toEqual([]);
  // 1.5 K in a minute is within what water can do.
  expect(check(put(steady(7), { 20: 8.5 }))).toEqual([]);
  expect(check(put(steady(7), { 20: 12 }))).toHaveLength(1);
  expect(check(put(steady(7), { 39: 12 }))).toEqual([]);
});

it("passes over rows that are left out or empty", () => {
  const series = shortSeries({ supply: put(steady(7), { 10: NaN, 20: 60, 21: 60 }) }, MINUTE_MS);
  series.columns.quality[20] = RowQuality.excluded;
  const [finding] = hampelSpikes(series, { boreMm: null });
  expect(finding!.rows).toEqual([{ from: 21, to: 22 }]);
});

it("proves nothing with fewer than fifteen readings", () => {
  const series = shortSeries({ supply: put(steady(7, 14), { 7: 60 }) });
  expect(hampelSpikes(series, { boreMm: null })).toEqual([]);
});

it("finds a spike among readings that hardly scatter, where any other would stand out", () => {
  const readings = Array.from({ length: 40 }, (_, row) => (row % 3 === 0 ? 6.48 : 6.51));
  const series = shortSeries({ supply: readings.map((c, row) => (row === 20 ? c + 47 : c)) });
  expect(hampelSpikes(series, { boreMm: null }).map(({ rows }) => rows)).toEqual([
    [{ from: 20, to: 21 }],
  ]);
});
