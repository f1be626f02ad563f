import cells from "@test/fixtures/import-cells.json";
import { shortSeries } from "@test/generators/clean-series";
import { MINUTE_MS } from "../../time/interval";
import { reversedFlow } from "./reversed-flow";

const check = (flow: readonly number[], stepMs?: number) =>
  reversedFlow(shortSeries({ flow }, stepMs), { boreMm: 102.26 });
const times = (count: number, value: number) => Array.from({ length: count }, () => value);

it("proposes one sign for the whole of a steady negative flow (cell B22)", () => {
  const { flow } = cells.find(({ id }) => id === "B22")!;
  const series = shortSeries({ flow: flow! });
  const [finding, ...others] = reversedFlow(series, { boreMm: null });
  expect(others).toEqual([]);
  expect(finding).toMatchObject({
    code: "reversedFlow",
    weight: "stop",
    rows: [{ from: 0, to: 3 }],
    figures: { negativeSharePercent: 100, medianM3PerHour: -31, runs: 1 },
    choices: [{ change: "flipFlow", span: finding!.spans[0] }, { change: "keep" }],
  });
});

it("counts only time with flow", () => {
  const flow = [...times(50, 0), ...times(50, -0.1), ...times(20, -31), 31];
  expect(check(flow).map(({ code }) => code)).toEqual(["reversedFlow"]);
  expect(check([...times(50, 0.05), ...times(50, -0.1)])).toEqual([]);
});

it("takes a short run back where the pump stops for what it is", () => {
  const flow = [...times(30, 31), -2, -1, ...times(30, 0), ...times(30, 31)];
  expect(check(flow, MINUTE_MS)).toMatchObject([
    {
      code: "backflow",
      weight: "note",
      rows: [{ from: 30, to: 32 }],
      choices: [{ change: "keep" }, {}],
    },
  ]);
});

it("asks to look where flow turns while it runs, and offers to turn what reaches an end", () => {
  const middle = check([...times(40, 31), ...times(20, -31), ...times(40, 31)]);
  expect(middle).toMatchObject([
    { code: "flowTurns", weight: "look", rows: [{ from: 40, to: 60 }] },
  ]);
  expect(middle[0]!.choices.map(({ change }) => change)).toEqual(["exclude", "keep"]);
  const [end] = check([...times(40, 31), ...times(20, -31)]);
  expect(end!.choices[0]).toEqual({ change: "flipFlow", span: end!.spans[0] });
});
