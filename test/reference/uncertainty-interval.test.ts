import { thermalPowerKw } from "@shared/domain/energy/power";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { budgetFromEvidence } from "@shared/domain/uncertainty/budget-from-evidence";
import { combineInterval } from "@shared/domain/uncertainty/combine-interval";
import type { CombinedUncertainty } from "@shared/domain/uncertainty/budget";
import { WORKED_EVIDENCE, WORKED_INPUT, WORKED_STATE } from "./uncertainty-worked-interval";

// The components were worked out by another program from the method of JCGM 100 (GUM), 4 and 5.
const COMPONENTS = {
  certificate: 0.5,
  drift: 0.288675,
  zero: 0.600924,
  bore: 0.440945,
  profile: 1.154701,
  remount: 0.4,
  density: 0.0288956,
  enthalpy: 0.05,
  probePair: 0.508475,
  mounting: 0.97856,
  pairDrift: 0.293568,
  flowNoise: 0.8,
  flowStep: 0.0360844,
  deltaTNoise: 0.338983,
  deltaTStep: 0.0691946,
  alignment: 0.3,
} as const;

function combined(input = WORKED_INPUT): CombinedUncertainty {
  const result = combineInterval(budgetFromEvidence(input), WORKED_STATE);
  if (result === null) throw new Error("the worked interval can be put");
  return result;
}

test("the worked interval's evidence gives sixteen components, each of the size worked out", () => {
  const { terms } = combined();
  const percent = Object.fromEntries(terms.map((each) => [each.term.kind, each.percent]));
  expect(Object.keys(percent).sort()).toEqual(Object.keys(COMPONENTS).sort());
  for (const [kind, expected] of Object.entries(COMPONENTS)) {
    // Six figures are printed.
    expect(Math.abs(percent[kind]! / expected - 1)).toBeLessThan(2e-6);
  }
  expect(terms.map((each) => each.percent)).toEqual(
    terms.map((each) => each.percent).sort((a, b) => b - a),
  );
});

test("its power is 197.798 kW ± 4.26092 %, k = 2, which is 8.42802 kW", () => {
  const powerKw = Math.abs(thermalPowerKw(28.8, 6.9, 12.8, waterAtPressure(1.6), "return"));
  expect(powerKw).toBeCloseTo(197.798, 3);
  const result = combined();
  expect(result.systematicPercent).toBeCloseTo(1.92038, 5);
  expect(result.randomPercent).toBeCloseTo(0.922496, 6);
  expect(result.combinedPercent).toBeCloseTo(2.13046, 5);
  expect(result.expandedPercent).toBeCloseTo(4.26092, 5);
  expect(result.expanded).toBeCloseTo(8.42802, 4);
  expect(result.k).toBe(2);
});

test("with class B probes nobody compared, ΔT alone brings 4.83755 % and the whole 5.25319 %", () => {
  const result = combined({ ...WORKED_INPUT, evidence: { ...WORKED_EVIDENCE, bathCheck: null } });
  const pair = result.terms.find((each) => each.term.kind === "probePair");
  expect(pair?.term.standard).toBeCloseTo(0.285416, 6);
  expect(pair?.percent).toBeCloseTo(4.83755, 5);
  expect(result.combinedPercent).toBeCloseTo(5.25319, 5);
  expect(result.terms[0]).toBe(pair);
});
