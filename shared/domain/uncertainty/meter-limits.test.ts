import { expandedFromLimitsPercent, meterLimits, type MeterLimitState } from "./meter-limits";

const total = (state: Omit<MeterLimitState, "deltaTMinK">) =>
  meterLimits({ ...state, deltaTMinK: 3 })?.totalPercent;

// E = E_f + E_t + E_c; structure after Directive 2014/32/EU, Annex VI; formulas after EN 1434-1, from
// memory; the totals worked out by another program.
test.each([
  { flowRatio: 1, times: 1, totals: [6.01, 7.02, 8.05] },
  { flowRatio: 1, times: 10, totals: [2.41, 3.42, 4.45] },
  { flowRatio: 0.1, times: 2, totals: [4.1, 5.2, 6.5] },
  { flowRatio: 0.01, times: 2, totals: [5, 7, 8] },
  { flowRatio: 0.004, times: 1, totals: [8.5, 10, 10] },
])("limits at $flowRatio q_p and $times Δθ_min", ({ flowRatio, times, totals }) => {
  const found = ([1, 2, 3] as const).map((meterClass) =>
    total({ meterClass, flowRatio, deltaTK: 3 * times }),
  );
  for (const [i, expected] of totals.entries()) expect(found[i]).toBeCloseTo(expected, 10);
});

test("the cap is a setting: 3.5 % holds class 1 where 5 % would not", () => {
  const small = { meterClass: 1, flowRatio: 0.002, deltaTK: 6 } as const;
  expect(total(small)).toBeCloseTo(5 + 2 + 1, 10);
  expect(total({ ...small, flowCapPercent: 3.5 })).toBeCloseTo(3.5 + 2 + 1, 10);
});

test("without flow or ΔT there is no limit to give; cooling counts like heating", () => {
  expect(total({ meterClass: 2, flowRatio: 0, deltaTK: 6 })).toBeUndefined();
  expect(total({ meterClass: 2, flowRatio: 1, deltaTK: 0 })).toBeUndefined();
  expect(total({ meterClass: 2, flowRatio: 1, deltaTK: -6 })).toBe(
    total({ meterClass: 2, flowRatio: 1, deltaTK: 6 }),
  );
});

test("the limits of a class as half-width of a rectangle, expanded", () => {
  const limits = meterLimits({ meterClass: 2, flowRatio: 0.42, deltaTK: 18.4, deltaTMinK: 3 })!;
  expect(limits.totalPercent).toBeCloseTo(3.699793, 6);
  expect(expandedFromLimitsPercent(limits)).toBeCloseTo(4.272153, 6);
});
