import { HOUR_MS, MINUTE_MS } from "../../time/interval";
import { INTERVAL_MS } from "../interval-energy";
import { energyOf, openQuarters, type CoveredQuarter, type FillOutcome } from "./fill";
import { interpolate, type GapBetween } from "./interpolate";
import { likeDays } from "./like-days";
import { otherPoint } from "./other-point";

const monday = Date.UTC(2026, 1, 2);
const day = 24 * HOUR_MS;

function filled(outcome: FillOutcome) {
  if (!outcome.ok) throw new Error(outcome.problem.code);
  return outcome.fill;
}
const code = (outcome: FillOutcome) => (outcome.ok ? null : outcome.problem.code);

const gap = (from: number, minutes: number, before: number, after: number): GapBetween => ({
  startMs: from,
  endMs: from + minutes * MINUTE_MS,
  before: { powerKw: before, flowM3PerHour: 10 },
  after: { powerKw: after, flowM3PerHour: 20 },
});

test("gaps are cut at quarter-hours, and two in one stay two pieces of it", () => {
  const at = (from: number, to: number) => ({
    startMs: from * MINUTE_MS,
    endMs: to * MINUTE_MS,
  });
  const quarters = openQuarters([at(2, 4), at(10, 20)]);
  expect(quarters.map(({ startMs, pieces }) => [startMs / MINUTE_MS, pieces])).toEqual([
    [0, [at(2, 4), at(10, 15)]],
    [15, [at(15, 20)]],
  ]);
});

test("a line from 100 to 200 kW over half an hour is 75 kWh, open by its half difference at least", () => {
  const { quarters, uncertaintyPercent } = filled(interpolate([gap(monday, 30, 100, 200)], []));
  // 25 min·kW: quarters of means 125 and 175 kW.
  expect(quarters.map(({ heatingKwh }) => heatingKwh)).toEqual([31.25, 43.75]);
  expect(quarters.map(({ volumeM3 }) => volumeM3)).toEqual([3.125, 4.375]);
  expect(uncertaintyPercent).toBeCloseTo((50 / Math.sqrt(3) / 150) * 100, 9);
  const lively = filled(interpolate([gap(monday, 30, 100, 200)], [50, 250]));
  expect(lively.uncertaintyPercent).toBeCloseTo((141.421356 / 150) * 100, 5);
});

test("a line through zero fills both registers and nets nothing", () => {
  const { quarters } = filled(interpolate([gap(monday, 15, 40, -20)], []));
  // Zero at two thirds: 40/2 kW for 10 min and 20/2 kW for 5 min.
  expect(quarters[0]?.heatingKwh).toBeCloseTo(20 / 6, 9);
  expect(quarters[0]?.coolingKwh).toBeCloseTo(10 / 12, 9);
});

test("a gap over an hour is not joined by a line", () => {
  expect(code(interpolate([gap(monday, 61, 1, 1)], []))).toBe("gap-too-long");
  expect(code(interpolate([gap(monday, 60, 1, 1)], []))).toBeNull();
  expect(code(interpolate([], []))).toBe("nothing-to-fill");
});

/** Whole quarter-hours, `kwh` each by day since that Monday; null where nothing is covered. */
const quartersOf = (kwh: (day: number) => number | null) => (startMs: number) => {
  const value = kwh(Math.floor((startMs - monday) / day));
  const quarter: CoveredQuarter | null =
    value === null
      ? null
      : { coveredS: 900, heatingKwh: 0, coolingKwh: value, volumeM3: value / 2 };
  return quarter;
};

test("an hour of Thursday is the mean of the three working days before, with their spread", () => {
  const thursday = {
    startMs: monday + 3 * day + 8 * HOUR_MS,
    endMs: monday + 3 * day + 9 * HOUR_MS,
  };
  const fill = filled(
    likeDays([thursday], {
      zone: "UTC",
      workingDays: [1, 2, 3, 4, 5],
      quarterAt: quartersOf((since) => [10, 10.5, 11][since] ?? null),
    }),
  );
  // 40, 42 and 44 kWh in the hour: 42 ± 2·√(4/3).
  expect(energyOf(fill.quarters)).toBeCloseTo(42, 9);
  expect(fill.uncertaintyPercent).toBeCloseTo(((2 * Math.sqrt(4 / 3)) / 42) * 100, 9);
  expect(fill.days).toEqual(["2026-02-02", "2026-02-03", "2026-02-04"]);
  expect(fill.quarters[0]?.volumeM3).toBeCloseTo(5.25, 9);
});

test("a Monday takes Friday, not the weekend, and a day that is not whole then is passed over", () => {
  const nextMonday = { startMs: monday + 7 * day, endMs: monday + 7 * day + 10 * MINUTE_MS };
  const fill = filled(
    likeDays([nextMonday], {
      zone: "UTC",
      workingDays: [1, 2, 3, 4, 5],
      quarterAt: quartersOf((since) => (since === 3 || since >= 7 ? null : since)),
    }),
  );
  expect(fill.days).toEqual(["2026-02-03", "2026-02-04", "2026-02-06"]);
  // (1 + 2 + 4)/3 for ten of fifteen minutes.
  expect(fill.quarters).toEqual([
    expect.objectContaining({ filledS: 600, coolingKwh: expect.closeTo((7 / 3) * (2 / 3), 9) }),
  ]);
});

test("the same time of day is the wall's, also across a clock change", () => {
  // Paris: 29 March 2026 at 02:00. Monday 30 March 08:00 is 06:00 UTC, Friday's is 07:00 UTC.
  const at = Date.UTC(2026, 2, 30, 6);
  const asked: string[] = [];
  likeDays([{ startMs: at, endMs: at + INTERVAL_MS }], {
    zone: "Europe/Paris",
    workingDays: [1, 2, 3, 4, 5],
    quarterAt(startMs) {
      asked.push(new Date(startMs).toISOString().slice(0, 16));
      return { coveredS: 900, heatingKwh: 1, coolingKwh: 0, volumeM3: null };
    },
  });
  expect(asked).toEqual(["2026-03-27T07:00", "2026-03-26T07:00", "2026-03-25T07:00"]);
});

test("two like days are too few, and the answer says for which day", () => {
  const outcome = likeDays([{ startMs: monday + 2 * day, endMs: monday + 2 * day + HOUR_MS }], {
    zone: "UTC",
    workingDays: [1, 2, 3, 4, 5],
    quarterAt: quartersOf((since) => (since >= 0 && since < 2 ? 1 : null)),
  });
  expect(outcome).toEqual({
    ok: false,
    problem: { code: "too-few-like-days", date: "2026-02-04", found: 2 },
  });
});

test("another point fills by the ratio of sums over the time both measured", () => {
  const gaps = [{ startMs: monday + 2 * day, endMs: monday + 2 * day + HOUR_MS }];
  const fill = filled(
    otherPoint(gaps, {
      common: { startMs: monday, endMs: monday + 3 * day },
      own: quartersOf((since) => (since === 0 ? 10 : since === 1 ? 14 : null)),
      other: quartersOf(() => 10),
    }),
  );
  // R = 24/20 = 1.2: four quarter-hours of 12.
  expect(fill.quarters.map(({ coolingKwh }) => coolingKwh)).toEqual([12, 12, 12, 12]);
  // 48 windows of an hour left −8 or +8 kWh: s = 8·√(48/47), and the ratio's own share of it.
  const s = 8 * Math.sqrt(48 / 47);
  expect(fill.uncertaintyPercent).toBeCloseTo((Math.hypot(s, s / Math.sqrt(48)) / 48) * 100, 6);
});

test("another point says nothing with under a day in common, at rest, or open at the gap", () => {
  const gaps = [{ startMs: monday + 2 * day, endMs: monday + 2 * day + HOUR_MS }];
  const common = { startMs: monday, endMs: monday + 3 * day };
  const ten = quartersOf((since) => (since === 0 ? 10 : null));
  const short = { ...common, endMs: monday + day - INTERVAL_MS };
  expect(code(otherPoint(gaps, { common: short, own: ten, other: quartersOf(() => 10) }))).toBe(
    "too-little-in-common",
  );
  expect(code(otherPoint(gaps, { common, own: ten, other: quartersOf(() => 0) }))).toBe(
    "other-point-at-rest",
  );
  expect(code(otherPoint(gaps, { common, own: ten, other: ten }))).toBe("other-point-open");
});
