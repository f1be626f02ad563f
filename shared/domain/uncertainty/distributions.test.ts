import { standardFromExpanded, standardFromHalfWidth, standardFromStep } from "./distributions";
import { pairUncertaintyFromClassK } from "./pair-from-class";
import { classLimitK } from "./probe-class";

test("half-widths, expanded values and steps become standard uncertainties", () => {
  expect(standardFromHalfWidth(0.1)).toBeCloseTo(0.057735, 6);
  expect(standardFromHalfWidth(-0.1)).toBe(standardFromHalfWidth(0.1));
  expect(standardFromExpanded(1, 2)).toBe(0.5);
  expect(standardFromExpanded(1, 3)).toBeCloseTo(1 / 3, 12);
  expect(standardFromStep(0.01)).toBeCloseTo(0.00288675, 8);
});

// IEC 60751: AA ±(0.1 + 0.0017·|t|), A ±(0.15 + 0.002·|t|), B ±(0.3 + 0.005·|t|).
test("class limits of one probe grow with the distance from 0 °C, either way", () => {
  expect(classLimitK("AA", 100)).toBeCloseTo(0.27, 12);
  expect(classLimitK("A", 100)).toBeCloseTo(0.35, 12);
  expect(classLimitK("B", 100)).toBeCloseTo(0.8, 12);
  expect(classLimitK("B", 12.8)).toBeCloseTo(0.364, 12);
  expect(classLimitK("B", -20)).toBe(classLimitK("B", 20));
});

test("two class B probes nobody compared leave 0.285416 K in ΔT at 6.9 and 12.8 °C", () => {
  const cold = { probeClass: "B", temperatureC: 6.9 } as const;
  const warm = { probeClass: "B", temperatureC: 12.8 } as const;
  expect(pairUncertaintyFromClassK(cold, warm)).toBeCloseTo(0.285416, 6);
  expect(pairUncertaintyFromClassK(warm, cold)).toBe(pairUncertaintyFromClassK(cold, warm));
  expect(pairUncertaintyFromClassK({ ...cold, probeClass: "AA" }, warm)).toBeLessThan(0.2854);
});
