import cells from "@test/fixtures/import-cells.json";
import { shortSeries } from "@test/generators/clean-series";
import {
  flowUnitCandidates,
  LOOP_WINDOW_C,
  temperatureUnitCandidates,
  unitPlausibility,
  type UnitLimits,
} from "./unit-plausibility";

const times = (count: number, value: number) => Array.from({ length: count }, () => value);
const limits: UnitLimits = { boreMm: 102.26, designFlowM3PerHour: null, service: "cooling" };

it("gives the water's speed in this bore under each unit", () => {
  const candidates = flowUnitCandidates(Float64Array.from(times(50, 130)), 102.26);
  expect(candidates.map(({ unit, verdict }) => [unit, verdict])).toEqual([
    ["m3/h", "possible"],
    ["L/s", "no"],
    ["L/min", "possible"],
    ["US gpm", "usual"],
    ["L/h", "no"],
  ]);
  // 1 m/s in this bore is 29.5668 m³/h.
  expect(candidates.map(({ medianMPerS }) => medianMPerS * 29.5668)).toEqual(
    [130, 130 * 3.6, 130 * 0.06, 130 * 0.22712470704, 130 / 1000].map((m3PerHour) =>
      expect.closeTo(m3PerHour, 2),
    ),
  );
});

it("takes 100 US gpm for what they are (cell B27)", () => {
  const { gpm, m3h } = cells.find(({ id }) => id === "B27")!;
  const found = flowUnitCandidates(Float64Array.of(gpm!), 102.26).find(
    ({ unit }) => unit === "US gpm",
  )!;
  expect(found.medianMPerS * 29.5668).toBeCloseTo(m3h!, 2);
  expect(found.verdict).toBe("usual");
});

it("lets a pump that stands most of the time say nothing", () => {
  const readings = Float64Array.from([...times(970, 0), ...times(30, 31)]);
  expect(flowUnitCandidates(readings, 102.26)[0]!.verdict).toBe("usual");
  expect(flowUnitCandidates(Float64Array.from(times(9, 0)), 102.26)).toEqual([]);
});

it("lets the design flow decide between units that are all possible", () => {
  const readings = Float64Array.from(times(50, 8));
  const verdicts = (design: number | null) =>
    flowUnitCandidates(readings, 102.26, design).map(({ verdict }) => verdict);
  expect(verdicts(null)).toEqual(["possible", "usual", "no", "possible", "no"]);
  expect(verdicts(32)).toEqual(["possible", "usual", "no", "possible", "no"]);
  expect(verdicts(8)).toEqual(["possible", "no", "no", "possible", "no"]);
});

it("tells 44 and 54 in a chilled loop for °F, and asks nothing of a hot one", () => {
  const { f_values: cell } = cells.find(({ id }) => id === "B26")!;
  const readings = Float64Array.of(cell!.F[1]!, 54);
  const chilled = temperatureUnitCandidates(readings, LOOP_WINDOW_C.cooling);
  expect(chilled.map(({ unit, verdict }) => [unit, verdict])).toEqual([
    ["degC", "no"],
    ["degF", "usual"],
    ["K", "no"],
  ]);
  expect(chilled[1]!.lowC).toBeCloseTo(cell!.C[1]!, 6);
  const hot = temperatureUnitCandidates(readings, LOOP_WINDOW_C.heating);
  expect(hot.map(({ verdict }) => verdict)).toEqual(["usual", "no", "no"]);
});

it("stops where the unit cannot be, and offers those that can, best first", () => {
  // 130 gpm that were read as L/s.
  const series = shortSeries({ flow: times(50, 130 * 3.6) });
  const [finding] = unitPlausibility(series, { ...limits, flowUnit: "L/s" });
  expect(finding).toMatchObject({
    code: "flowUnit",
    weight: "stop",
    rows: [{ from: 0, to: 50 }],
    figures: { unit: "L/s", otherUnit: "US gpm" },
  });
  expect(finding!.choices).toEqual([
    { change: "unit", channel: "flow", unit: "US gpm" },
    { change: "unit", channel: "flow", unit: "m3/h" },
    { change: "unit", channel: "flow", unit: "L/min" },
    { change: "keep" },
  ]);
});

it("only asks to look where no unit fits, since the bore may be wrong", () => {
  const series = shortSeries({ flow: times(50, 31) });
  const [finding] = unitPlausibility(series, { ...limits, boreMm: 2000 });
  expect(finding).toMatchObject({ weight: "look", figures: { otherUnit: null } });
});

it("finds temperatures that were read in the wrong unit", () => {
  const series = shortSeries({ supply: times(50, 44), return: times(50, 54) });
  expect(unitPlausibility(series, limits)).toMatchObject([
    {
      code: "temperatureUnit",
      weight: "stop",
      figures: { unit: "degC", lowC: 44, highC: 54, otherUnit: "degF" },
      choices: [{ unit: "degF" }, { change: "keep" }],
    },
  ]);
  expect(unitPlausibility(series, { ...limits, service: "heating" })).toEqual([]);
  // 6.67 and 12.2 °C that were °F: the numbers as written decide.
  const converted = shortSeries({ supply: times(50, 44 / 1.8 - 32 / 1.8) });
  expect(unitPlausibility(converted, { ...limits, temperatureUnit: "degF" })).toEqual([]);
});
