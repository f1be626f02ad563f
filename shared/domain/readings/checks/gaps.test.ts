import { shortSeries } from "@test/generators/clean-series";
import { DAY_MS, HOUR_MS, MINUTE_MS } from "../../time/interval";
import { RowQuality } from "../reading-columns";
import { gapsFinding, summariseGaps } from "./gaps";

const STEP_MS = 15 * MINUTE_MS;
const at = (instants: readonly number[]) =>
  shortSeries({ flow: instants.map(() => 31) }, STEP_MS, instants);
const quarters = (fromMs: number, toMs: number) =>
  Array.from({ length: (toMs - fromMs) / STEP_MS + 1 }, (_, i) => fromMs + i * STEP_MS);

it("measures a gap from reading to reading and counts the rows it lacks", () => {
  const series = at([...quarters(0, HOUR_MS), ...quarters(4 * HOUR_MS, 5 * HOUR_MS)]);
  const summary = summariseGaps(series, "survey");
  expect(summary).toMatchObject({
    count: 1,
    missingRows: 11,
    missingMs: 2.75 * HOUR_MS,
    gaps: [{ startMs: HOUR_MS, endMs: 4 * HOUR_MS }],
    byLength: { upToHour: { count: 0 }, upToDay: { count: 1 }, overDay: { count: 0 } },
  });
  // 10 rows of a quarter-hour in the 5 h 15 min that they span.
  expect(summary.completeness).toBeCloseTo((10 * 0.25) / 5.25, 12);
});

it("is stricter for billing than for a survey", () => {
  const series = at([0, 1, 3, 6, 10].map((step) => step * STEP_MS));
  expect(summariseGaps(series, "survey").gaps.map(({ startMs }) => startMs / STEP_MS)).toEqual([6]);
  expect(summariseGaps(series, "billing").gaps.map(({ startMs }) => startMs / STEP_MS)).toEqual([
    1, 3, 6,
  ]);
});

it("sorts gaps by what may fill them, and looks where less than 95 % is there", () => {
  const series = at([
    ...quarters(0, DAY_MS),
    ...quarters(DAY_MS + HOUR_MS, 2 * DAY_MS),
    ...quarters(2 * DAY_MS + 5 * HOUR_MS, 3 * DAY_MS),
    ...quarters(5 * DAY_MS, 30 * DAY_MS),
  ]);
  const finding = gapsFinding(series, "survey")!;
  expect(finding.figures).toMatchObject({
    count: 3,
    upToHour: 1,
    upToDay: 1,
    overDay: 1,
    longestHours: 48,
    longestFromMs: 3 * DAY_MS,
  });
  expect(finding).toMatchObject({ weight: "look", rows: [], choices: [{ change: "keep" }] });
  expect(
    gapsFinding(at([...quarters(0, DAY_MS), ...quarters(DAY_MS + HOUR_MS, 9 * DAY_MS)]), "survey")!
      .weight,
  ).toBe("note");
});

it("takes a row that says it has no reading for none, and one left out for one", () => {
  const series = at(quarters(0, 5 * HOUR_MS));
  series.columns.quality.fill(RowQuality.excluded, 2, 8);
  expect(gapsFinding(series, "survey")).toBeNull();
  series.columns.quality.fill(RowQuality.noReading, 2, 8);
  expect(gapsFinding(series, "survey")!.figures.missingRows).toBe(6);
});
