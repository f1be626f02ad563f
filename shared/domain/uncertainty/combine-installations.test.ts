import { WORKED_INPUT } from "@test/reference/uncertainty-worked-interval";
import type { CombinedUncertainty } from "./budget";
import { budgetFromEvidence } from "./budget-from-evidence";
import { budgetTerm, originOf, standard } from "./budget-term";
import { combineInstallations } from "./combine-installations";
import { combinePeriod } from "./combine-period";
import { combineTerms } from "./combine-terms";
import { differenceUncertainty, ratioUncertainty } from "./difference";

const origin = originOf("default", "driftAssumed", { halfWidthPercent: 1 });
const systematic = budgetTerm("certificate", standard(2, "%"), origin);
const random = budgetTerm("flowNoise", standard(1, "%"), origin);

function figure(value: number, randomPercent = 1): CombinedUncertainty {
  return combineTerms(
    [
      { term: systematic, percent: 2, shrinks: false },
      { term: random, percent: randomPercent, shrinks: true },
    ],
    value,
    100,
    50,
  );
}
const part = (value: number, meter?: string) => ({
  value,
  combined: figure(value),
  ...(meter === undefined ? {} : { sources: { certificate: meter } }),
});

test("over two installations systematic parts add up straight and random ones as squares", () => {
  const range = combineInstallations([part(100), part(300)]);
  expect(range?.systematicPercent).toBeCloseTo(2, 12);
  expect(range?.randomPercent).toBeCloseTo((100 * Math.hypot(1, 3)) / 400, 12);
  expect(range?.expanded).toBeCloseTo(2 * Math.hypot(8, Math.hypot(1, 3)), 12);
  expect(range?.sharedKinds).toEqual(["certificate"]);
  expect(range?.samples).toBe(200);
});

test("meters known to differ are independent, one unknown meter among them is not", () => {
  const two = combineInstallations([part(100, "F-1"), part(300, "F-2")]);
  expect(two?.systematicPercent).toBeCloseTo((100 * Math.hypot(2, 6)) / 400, 12);
  expect(two?.separateKinds).toEqual(["certificate"]);
  const same = combineInstallations([part(100, "F-1"), part(300, "F-1")]);
  expect(same?.systematicPercent).toBeCloseTo(2, 12);
  const unknown = combineInstallations([part(100, "F-1"), part(300)]);
  expect(unknown?.systematicPercent).toBeCloseTo(2, 12);
  const three = combineInstallations([part(100, "F-1"), part(100, "F-2"), part(200, "F-1")]);
  expect(three?.systematicPercent).toBeCloseTo((100 * Math.hypot(6, 2)) / 400, 12);
});

test("one installation cut in two is as uncertain as it was whole", () => {
  const budget = budgetFromEvidence(WORKED_INPUT);
  const state = {
    figure: "energy",
    flowWeightedDeltaTK: 5.9,
    deltaTWeightedVelocityMPerS: 0.96,
    meanVelocityMPerS: 0.96,
    flowSpreadM3PerHour: 10,
    deltaTSpreadK: 1,
  } as const;
  const whole = combinePeriod(budget, { ...state, value: 2000, samples: 2000 })!;
  const half = combinePeriod(budget, { ...state, value: 1000, samples: 1000 })!;
  const joined = combineInstallations([
    { value: 1000, combined: half },
    { value: 1000, combined: half },
  ]);
  expect(joined?.combinedPercent).toBeCloseTo(whole.combinedPercent, 9);
  expect(joined?.terms).toHaveLength(whole.terms.length);
});

test("no parts and a figure of 0 say nothing", () => {
  expect(combineInstallations([])).toBeNull();
  expect(combineInstallations([part(0)])).toBeNull();
});

const a = { value: 1000, combined: figure(1000, 0.1) };
const b = { value: 900, combined: figure(900, 0.1) };

test("in a difference of two weeks of one loop the shared errors cancel as far as they are shared", () => {
  expect(differenceUncertainty(a, b, "all").standard).toBeCloseTo(2.410394, 6);
  expect(differenceUncertainty(a, b, new Set()).standard).toBeCloseTo(26.94086, 4);
  expect(differenceUncertainty(a, b, new Set(["certificate"] as const))).toEqual(
    differenceUncertainty(a, b, "all"),
  );
  expect(differenceUncertainty(a, b, "all")).toMatchObject({ difference: 100 });
});

test("in their ratio a shared error of the same percentage cancels whole", () => {
  const ratio = ratioUncertainty(a, b, "all");
  expect(ratio?.ratio).toBeCloseTo(1.111111, 6);
  expect(ratio?.standard).toBeCloseTo(0.001571348, 9);
  expect(ratioUncertainty(a, { ...b, value: 0 }, "all")).toBeNull();
});

test("a figure less itself has only its random part left", () => {
  const own = differenceUncertainty(a, a, "all");
  expect(own.standard).toBeCloseTo(Math.SQRT2, 12);
});

test("what was filled in one week is no error of the other", () => {
  const filled = budgetTerm("filled", standard(1, "%"), origin);
  const week = (value: number) => ({
    value,
    combined: combineTerms([{ term: filled, percent: 1, shrinks: false }], value, 100, 50),
  });
  expect(differenceUncertainty(week(1000), week(1000), "all").standard).toBeCloseTo(
    10 * Math.SQRT2,
    9,
  );
});
