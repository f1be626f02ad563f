import { shortSeries } from "@test/generators/clean-series";
import { DAY_MS, MINUTE_MS } from "../../time/interval";
import { farDates } from "./far-dates";

const MARCH_MS = Date.UTC(2025, 2, 1);
const STEP_MS = 15 * MINUTE_MS;
const week = Array.from({ length: 672 }, (_, row) => MARCH_MS + row * STEP_MS);
const check = (instants: readonly number[], latestMs: number | null = null) =>
  farDates(shortSeries({ flow: instants.map(() => 31) }, STEP_MS, instants), { latestMs });

it("finds two rows of 1970 before a week of 2025", () => {
  const finding = check([0, STEP_MS, ...week])!;
  expect(finding).toMatchObject({
    code: "farDates",
    weight: "stop",
    rows: [{ from: 0, to: 2 }],
    figures: { firstMs: 0, lastMs: STEP_MS, restFromMs: MARCH_MS, restToMs: week.at(-1) },
  });
  expect(finding.figures.furthestDays! / 365.25).toBeCloseTo(55.2, 1);
  expect(finding.choices).toEqual([
    { change: "exclude", spans: finding.spans },
    { change: "keep" },
  ]);
});

it("finds a row of 2000 and one of 2099 on both sides", () => {
  const rows = [Date.UTC(2000, 0, 1), ...week, Date.UTC(2099, 11, 31)];
  expect(check(rows)!.rows).toEqual([
    { from: 0, to: 1 },
    { from: 673, to: 674 },
  ]);
});

it("finds a clock that ran on from 1970, however many rows it wrote", () => {
  const lost = Array.from({ length: 3000 }, (_, row) => row * STEP_MS);
  expect(check([...lost, ...week])!.rows).toEqual([{ from: 0, to: 3000 }]);
  expect(check(lost)).toMatchObject({ rowCount: 3000, figures: { furthestDays: null } });
});

it("finds what is later than can be", () => {
  const rows = [...week, MARCH_MS + 10 * DAY_MS];
  expect(check(rows)).toBeNull();
  expect(check(rows, MARCH_MS + 9 * DAY_MS)!.rows).toEqual([{ from: 672, to: 673 }]);
});

it("leaves a gap, a second visit and a summer alone", () => {
  expect(check([...week, ...week.map((ms) => ms + 100 * DAY_MS)])).toBeNull();
  expect(check([...week, MARCH_MS + 36 * DAY_MS])).toBeNull();
  expect(check([...week, MARCH_MS + 80 * DAY_MS])!.rows).toEqual([{ from: 672, to: 673 }]);
  const year = Array.from({ length: 365 }, (_, day) => MARCH_MS + day * DAY_MS);
  expect(check([...year, MARCH_MS + 500 * DAY_MS])).toBeNull();
  expect(check([])).toBeNull();
});
