import { localDaysBetween } from "@shared/domain/time/local-calendar";
import { DAY_MS } from "@shared/domain/time/interval";
import { stretchesOf } from "./energy-stretches";

const startMs = Date.UTC(2025, 0, 1);
const days = localDaysBetween({ startMs, endMs: startMs + 400 * DAY_MS }, "Europe/London");
const lengths = (stepMs: number) => stretchesOf(days, stepMs).map(({ length }) => length);

test("minutes are worked out a quarter of a year at a time, seconds a few days", () => {
  expect(lengths(60_000)).toEqual([92, 92, 92, 92, 32]);
  expect(new Set(lengths(1000))).toEqual(new Set([5]));
  expect(lengths(100)[0]).toBe(1);
});

test("every day is in exactly one stretch, in order, also where no step is known", () => {
  expect(stretchesOf(days, 1000).flat()).toEqual(days);
  expect(stretchesOf(days, 0).flat()).toEqual(days);
  expect(stretchesOf([], 60_000)).toEqual([]);
});
