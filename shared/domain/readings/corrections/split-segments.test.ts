import { cleanSeries } from "@test/generators/clean-series";
import { coverage } from "../coverage";
import { HOUR_MS, MINUTE_MS } from "../../time/interval";
import { correctSegments } from "./correct-segments";
import { splitSegments } from "./split-segments";

const series = cleanSeries({ rows: 96 });
const at = (row: number) => series.columns.instantMs[row]!;

it("parts rows at an instant and covers nothing between the two parts", () => {
  const parts = splitSegments([series], at(40));
  expect(parts.map(({ columns }) => columns.instantMs.length)).toEqual([40, 56]);
  expect(parts.map(({ startsAnew }) => startsAnew)).toEqual([undefined, true]);
  expect(parts[1]!.columns.instantMs[0]).toBe(at(40));
  const window = { startMs: at(0), endMs: at(95) };
  const lost = coverage([series], window).coveredMs - coverage(parts, window).coveredMs;
  expect(lost).toBe(15 * MINUTE_MS);
});

it("parts an instant that falls between two rows before the later one", () => {
  const parts = splitSegments([series], at(40) + 1);
  expect(parts[1]!.columns.instantMs[0]).toBe(at(41));
});

it("joins no segments that meet at the instant", () => {
  const [first, second] = splitSegments([series], at(40));
  const joined = [first!, { ...second!, startsAnew: false }];
  const parted = splitSegments(joined, at(40));
  expect(parted.map(({ startsAnew }) => startsAnew ?? false)).toEqual([false, true]);
});

it("covers all the time of means, which are never joined", () => {
  const means = cleanSeries({ rows: 96, kind: "meanToLabel" });
  const window = { startMs: at(0), endMs: at(95) };
  const parts = correctSegments([means], [{ kind: "split", atMs: at(40) }]);
  expect(parts.map(({ columns }) => columns.instantMs.length)).toEqual([41, 55]);
  expect(coverage(parts, window).coveredMs).toBe(coverage([means], window).coveredMs);
  expect(coverage([means], window).coveredMs).toBeGreaterThan(23 * HOUR_MS);
});

it("leaves an instant outside the readings alone", () => {
  expect(splitSegments([series], at(95) + 1)).toEqual([series]);
  expect(splitSegments([], 0)).toEqual([]);
});
