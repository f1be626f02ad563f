import { WORKED_INPUT } from "@test/reference/uncertainty-worked-interval";
import { budgetFromEvidence } from "./budget-from-evidence";
import { combineInterval } from "./combine-interval";
import { combinePeriod, type PeriodState } from "./combine-period";
import { effectiveSamples } from "./effective-samples";

const budget = budgetFromEvidence(WORKED_INPUT);
const WEEK: PeriodState = {
  figure: "energy",
  value: 33_230,
  flowWeightedDeltaTK: 5.9,
  deltaTWeightedVelocityMPerS: 0.960771,
  meanVelocityMPerS: 0.960771,
  samples: 2016,
  flowSpreadM3PerHour: 12,
  deltaTSpreadK: 2,
};
const period = (changed: Partial<PeriodState> = {}, of = budget) => {
  const result = combinePeriod(of, { ...WEEK, ...changed });
  if (result === null) throw new Error("the week can be put");
  return result;
};
const percentOf = (result: ReturnType<typeof period>, kind: string) =>
  result.terms.find((each) => each.term.kind === kind)?.percent;

test("effective readings are never more than there are and never less than one", () => {
  expect(effectiveSamples(2016, 0.6)).toBeCloseTo(504, 9);
  expect(effectiveSamples(2016, 0)).toBe(2016);
  expect(effectiveSamples(2016, -0.5)).toBe(2016);
  expect(effectiveSamples(3, 0.9)).toBe(1);
  expect(effectiveSamples(10, 1)).toBe(1);
  expect(effectiveSamples(0, 0)).toBe(1);
});

test("over a week systematic terms keep their size and random ones shrink by √N_eff", () => {
  const result = period();
  expect(result.effectiveSamples).toBeCloseTo(504, 9);
  expect(result.systematicPercent).toBeCloseTo(1.92038, 5);
  expect(result.randomPercent).toBeCloseTo(0.922496 / Math.sqrt(504), 7);
  expect(result.combinedPercent).toBeCloseTo(1.9208, 4);
  expect(result.expanded).toBeCloseTo((2 * result.combinedPercent * 33_230) / 100, 9);
});

test("the whole is never divided by √N", () => {
  const interval = combineInterval(budget, {
    figure: "power",
    value: 197.798,
    flowM3PerHour: 28.8,
    deltaTK: 5.9,
  });
  const wrong = interval!.combinedPercent / Math.sqrt(2016);
  expect(wrong).toBeLessThan(0.05);
  expect(period().combinedPercent).toBeGreaterThan(40 * wrong);
  expect(period({ samples: 1e9 }).combinedPercent).toBeGreaterThan(1.92);
});

test("one reading is the same as the interval", () => {
  const one = period({ samples: 1, value: 197.798 });
  expect(one.combinedPercent).toBeCloseTo(2.13046, 5);
});

test("a negative autocorrelation does not make more readings than there are", () => {
  const result = period({}, { ...budget, autocorrelation: -0.4 });
  expect(result.effectiveSamples).toBe(2016);
});

test("offsets are put to the flow-weighted ΔT and the ΔT-weighted speed", () => {
  const result = period({ flowWeightedDeltaTK: 2.95, deltaTWeightedVelocityMPerS: 0.4803855 });
  expect(percentOf(result, "probePair")).toBeCloseTo(2 * 0.508475, 5);
  expect(percentOf(result, "zero")).toBeCloseTo(2 * 0.600924, 5);
  expect(percentOf(result, "certificate")).toBe(0.5);
});

test("a logger's step shrinks only where the signal moves by more than a step", () => {
  const moving = period();
  expect(percentOf(moving, "deltaTStep")).toBeCloseTo(0.0691946 / Math.sqrt(504), 7);
  for (const deltaTSpreadK of [0.01, 0, null]) {
    const still = period({ deltaTSpreadK });
    expect(percentOf(still, "deltaTStep")).toBeCloseTo(0.0691946, 7);
    expect(still.systematicPercent).toBeGreaterThan(moving.systematicPercent);
  }
  const steady = period({ flowSpreadM3PerHour: 0.036 });
  expect(percentOf(steady, "flowStep")).toBeCloseTo(0.0360844, 6);
  const other = period({ flowSpreadM3PerHour: 0.037 });
  expect(percentOf(other, "flowStep")).toBeLessThan(0.002);
});

test("what was filled adds a term of its own", () => {
  const filled = period({ filledShare: 0.1, filledPercent: 20 });
  expect(percentOf(filled, "filled")).toBeCloseTo(2, 12);
  expect(filled.systematicPercent).toBeCloseTo(Math.hypot(1.92038, 2), 5);
  expect(percentOf(period({ filledShare: 0, filledPercent: 20 }), "filled")).toBeUndefined();
  expect(percentOf(period({ filledShare: 0.1 }), "filled")).toBeCloseTo(3, 12);
});

test("volume takes the terms of flow with the mean speed, ΔT its own", () => {
  const volume = period({
    figure: "volume",
    value: 4838.4,
    meanVelocityMPerS: 0.4803855,
    flowWeightedDeltaTK: null,
  });
  expect(volume.terms.map((each) => each.term.kind).sort()).toEqual(
    ["bore", "certificate", "drift", "flowNoise", "flowStep", "profile", "remount", "zero"].sort(),
  );
  expect(percentOf(volume, "zero")).toBeCloseTo(2 * 0.600924, 5);
  const deltaT = period({ figure: "deltaT", value: 5.9, deltaTWeightedVelocityMPerS: null });
  expect(deltaT.terms.map((each) => each.term.kind).sort()).toEqual(
    ["deltaTNoise", "deltaTStep", "mounting", "pairDrift", "probePair"].sort(),
  );
  const pair = deltaT.terms.find((each) => each.term.kind === "probePair");
  expect(pair?.absolute).toBeCloseTo(0.03, 12);
});

test("where a term cannot be put nothing is said, rather than too little", () => {
  expect(combinePeriod(budget, { ...WEEK, flowWeightedDeltaTK: null })).toBeNull();
  expect(combinePeriod(budget, { ...WEEK, flowWeightedDeltaTK: 0 })).toBeNull();
  expect(combinePeriod(budget, { ...WEEK, deltaTWeightedVelocityMPerS: null })).toBeNull();
  expect(combinePeriod(budget, { ...WEEK, samples: 0 })).toBeNull();
  const standing = { figure: "power", value: 0, flowM3PerHour: 0, deltaTK: 5 } as const;
  expect(combineInterval(budget, standing)).toBeNull();
});
