import { agreement, normalisedError } from "@shared/domain/uncertainty/agreement";
import { uncertaintyOfFunction } from "@shared/domain/uncertainty/correlated";

// JCGM 100:2008 (GUM), annex H.2: resistance, reactance and impedance measured together. Inputs and
// correlation coefficients as printed there; the results to more digits by another program (the GUM
// prints 0.071, 0.295 and 0.236 from unrounded inputs).
const VOLTS = { value: 4.999, standard: 0.0032 };
const AMPERES = { value: 19.661e-3, standard: 9.5e-6 };
const PHASE = { value: 1.04446, standard: 7.5e-4 };
const CORRELATIONS = [
  [1, -0.36, 0.86],
  [-0.36, 1, -0.65],
  [0.86, -0.65, 1],
];

test.each([
  ["R", ([v, i, phi]: readonly number[]) => (v! / i!) * Math.cos(phi!), 127.732, 0.06998],
  ["X", ([v, i, phi]: readonly number[]) => (v! / i!) * Math.sin(phi!), 219.847, 0.29572],
  ["Z", ([v, i]: readonly number[]) => v! / i!, 254.26, 0.2366],
] as const)("GUM H.2, %s, with correlated inputs", (_name, f, value, standard) => {
  const result = uncertaintyOfFunction(f, [VOLTS, AMPERES, PHASE], CORRELATIONS);
  expect(result.value).toBeCloseTo(value, 3);
  expect(result.standard).toBeCloseTo(standard, 5);
});

test("leaving the correlations of GUM H.2 out gives another result, several times as large for R", () => {
  const resistance = ([v, i, phi]: readonly number[]) => (v! / i!) * Math.cos(phi!);
  const independent = uncertaintyOfFunction(resistance, [VOLTS, AMPERES, PHASE]);
  expect(independent.standard).toBeGreaterThan(2.5 * 0.06998);
});

test("fully correlated inputs of opposite effect cancel, and an exact input adds nothing", () => {
  const one = { value: 5, standard: 0.1 };
  const difference = ([a, b]: readonly number[]) => a! - b!;
  const r1 = [
    [1, 1],
    [1, 1],
  ];
  expect(uncertaintyOfFunction(difference, [one, one], r1).standard).toBeCloseTo(0, 9);
  const exact = { value: 2, standard: 0 };
  expect(uncertaintyOfFunction(difference, [one, exact]).standard).toBeCloseTo(0.1, 9);
});

// ISO 13528, as worked in the NIST Dataplot reference manual: E_n takes expanded uncertainties.
test("E_n of a laboratory at 1.006 ± 0.009 against 1.000 ± 0.0123323 is 0.393", () => {
  expect(normalisedError(1.006 - 1, 0.009, 0.0123323)).toBeCloseTo(0.393, 4);
  const found = agreement({ value: 1.006, expanded: 0.009 }, { value: 1, expanded: 0.0123323 });
  expect(found.code).toBe("agree");
});
