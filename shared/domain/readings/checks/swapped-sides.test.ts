import { cleanSeries, shortSeries } from "@test/generators/clean-series";
import type { ReadingSegment } from "../reading-columns";
import { swappedSides } from "./swapped-sides";

const exchanged = (series: ReadingSegment): ReadingSegment => ({
  ...series,
  columns: { ...series.columns, supplyC: series.columns.returnC, returnC: series.columns.supplyC },
});
const times = (count: number, value: number) => Array.from({ length: count }, () => value);

it("stops where a chilled loop's supply is the warmer one and both meet when the pump stands", () => {
  const series = cleanSeries({ rows: 96 * 3 });
  expect(swappedSides(series, { service: "cooling", boreMm: 102.26 })).toBeNull();
  const finding = swappedSides(exchanged(series), { service: "cooling", boreMm: 102.26 })!;
  expect(finding).toMatchObject({
    weight: "stop",
    rows: [{ from: 0, to: 288 }],
    figures: { wrongSharePercent: expect.closeTo(100, -1) as number, standing: "comesTogether" },
  });
  expect(
    finding.choices.map((choice) => [choice.change, "swapped" in choice && choice.swapped]),
  ).toEqual([
    ["swapSides", "probes"],
    ["swapSides", "channels"],
    ["keep", false],
  ]);
});

it("goes by the loop's service, and leaves one that changes over alone", () => {
  const series = cleanSeries({ service: "heating", rows: 96 * 3 });
  expect(swappedSides(series, { service: "heating", boreMm: null })).toBeNull();
  expect(swappedSides(series, { service: "cooling", boreMm: null })).not.toBeNull();
  expect(swappedSides(series, { service: "changeover", boreMm: null })).toBeNull();
});

it("needs more than nine tenths of the time with flow", () => {
  const of = (wrong: number) => {
    const flow = [...times(100, 31), ...times(500, 0)];
    const supply = [...times(wrong, 12), ...times(100 - wrong, 6), ...times(500, 20)];
    const returned = [...times(wrong, 6), ...times(100 - wrong, 12), ...times(500, 20)];
    return swappedSides(shortSeries({ flow, supply, return: returned }), {
      service: "cooling",
      boreMm: 102.26,
    });
  };
  expect(of(90)).toBeNull();
  expect(of(91)!.figures.wrongSharePercent).toBeCloseTo(91, 9);
});

it("suspects an offset where the pipes stay apart when the pump stands", () => {
  const flow = [...times(40, 31), ...times(20, 0)];
  const supply = [...times(40, 6.4), ...times(20, 20.4)];
  const returned = [...times(40, 6), ...times(20, 20)];
  const finding = swappedSides(shortSeries({ flow, supply, return: returned }), {
    service: "cooling",
    boreMm: 102.26,
  });
  expect(finding).toMatchObject({ weight: "look", figures: { standing: "staysApart" } });
  expect(finding!.figures.standingDeltaTK).toBeCloseTo(0.4, 9);
});

it("says that no stop told, and gives a ΔT within the dead band no sign", () => {
  const of = (deltaTK: number) =>
    swappedSides(
      shortSeries({ flow: times(20, 31), supply: times(20, 6 + deltaTK), return: times(20, 6) }),
      { service: "cooling", boreMm: 102.26 },
    );
  expect(of(6)).toMatchObject({
    weight: "stop",
    figures: { standing: "noStop", standingDeltaTK: null },
  });
  expect(of(0.15)).toBeNull();
});
