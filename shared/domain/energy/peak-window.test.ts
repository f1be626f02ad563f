import { intervalColumns } from "@test/reference/interval-columns";
import { peakWindow } from "./peak-window";

const T0 = Date.UTC(2026, 4, 14);
const quarter = 900_000;

test("the busiest half hour is a whole one on the clock's half hours", () => {
  const columns = intervalColumns(T0, [10, 40, 50, 10]);
  expect(peakWindow(columns, { register: "cooling" })).toEqual({
    startMs: T0 + 2 * quarter,
    endMs: T0 + 4 * quarter,
    powerKw: 30,
  });
  expect(peakWindow(columns, { register: "cooling", alignment: "rolling" })).toEqual({
    startMs: T0 + quarter,
    endMs: T0 + 3 * quarter,
    powerKw: 45,
  });
  expect(peakWindow(columns, { register: "cooling", offsetMs: 5.75 * 3_600_000 })?.powerKw).toBe(
    45,
  );
});

test("a half hour with a hole in it never qualifies", () => {
  const columns = intervalColumns(T0, [10, 90, 50, 20]);
  columns.coveredS[1] = 880;
  expect(peakWindow(columns, { register: "cooling", alignment: "rolling" })?.powerKw).toBe(35);
  columns.coveredS[2] = 0;
  expect(peakWindow(columns, { register: "cooling", alignment: "rolling" })).toBeNull();
  expect(peakWindow(columns, { register: "heating" })).toBeNull();
});
