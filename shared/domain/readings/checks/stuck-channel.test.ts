import { shortSeries } from "@test/generators/clean-series";
import cells from "@test/fixtures/import-cells.json";
import { stuckChannels } from "./stuck-channel";

const B20 = cells.find(({ id }) => id === "B20")!;
/** Goes from 24 to 36 m³/h and back: 40 % of its mean. */
const moving = (count: number, span = 12) =>
  Array.from({ length: count }, (_, row) => 30 + (span / 2) * Math.sin(row / 3));

it("flags the 36 identical readings while flow varies by 40 % (cell B20)", () => {
  const series = shortSeries({ flow: moving(36), supply: B20.series! });
  const [finding] = stuckChannels(series, { designDeltaTK: null });
  expect(finding).toMatchObject({
    code: "stuckChannel",
    weight: "look",
    channel: "supplyC",
    rows: [{ from: 0, to: 36 }],
    figures: { runs: 1, value: 7.42, readings: 36, companion: "flowM3PerHour" },
  });
  expect(finding!.figures.companionVariationPercent).toBeGreaterThan(35);
  expect(finding!.choices).toEqual([
    { change: "exclude", spans: finding!.spans },
    { change: "keep" },
  ]);
});

it("needs thirty readings and a companion that varies by more than a tenth", () => {
  const of = (count: number, span: number) =>
    stuckChannels(shortSeries({ flow: moving(count, span), supply: moving(count).fill(7.42) }), {
      designDeltaTK: null,
    }).length;
  expect(of(30, 12)).toBe(1);
  expect(of(29, 12)).toBe(0);
  expect(of(36, 2.5)).toBe(0);
  expect(of(36, 4)).toBe(1);
});

it("is not moved by a single spike of the companion", () => {
  const flow = moving(40, 0.5).map((value, row) => (row === 9 ? 300 : value));
  const series = shortSeries({ flow, supply: flow.map(() => 7.42) });
  expect(stuckChannels(series, { designDeltaTK: null })).toEqual([]);
});

it("takes a pump that stands for no stuck flow, though pipes drift", () => {
  const supply = Array.from({ length: 60 }, (_, row) => 7 + row * 0.2);
  const of = (flow: number) =>
    stuckChannels(
      shortSeries({ flow: supply.map(() => flow), supply, return: supply.map((c) => c + 5) }),
      { designDeltaTK: 6 },
    ).map(({ channel }) => channel);
  expect(of(0)).toEqual([]);
  expect(of(31.2)).toEqual(["flowM3PerHour"]);
});

it("puts a temperature's variation to the loop's ΔT, not to its degrees", () => {
  // 1 K of 12 °C is 8 %, of 6 K it is 17 %.
  const supply = Array.from({ length: 40 }, (_, row) => 12 + 0.5 * Math.sin(row / 3));
  const series = shortSeries({ supply, return: supply.map(() => 18) });
  expect(stuckChannels(series, { designDeltaTK: 6 })).toMatchObject([{ channel: "returnC" }]);
  expect(stuckChannels(series, { designDeltaTK: 20 })).toEqual([]);
});

it("lists every run of a channel, and goes on over rows without a reading", () => {
  const supply = moving(120).map((value, row) =>
    row >= 10 && row < 45 ? 7.4 : row >= 60 && row < 100 ? (row === 70 ? NaN : 8.1) : value,
  );
  const [finding, ...others] = stuckChannels(shortSeries({ flow: moving(120), supply }), {
    designDeltaTK: null,
  });
  expect(others).toEqual([]);
  expect(finding!.rows).toEqual([
    { from: 10, to: 45 },
    { from: 60, to: 100 },
  ]);
  expect(finding!.figures).toMatchObject({ runs: 2, value: 8.1, readings: 39 });
});
