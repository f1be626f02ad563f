import { budgetBasis } from "./budget-basis";
import { combinePeriod } from "./combine-period";
import { budgetFromPlate, leastState, type MeterPlate } from "./meter-plate";

const plate = (changes: Partial<MeterPlate> = {}): MeterPlate => ({
  accuracyClass: 2,
  permanentFlowM3PerHour: null,
  minimumDeltaTK: null,
  certificate: null,
  ...changes,
});

/** U (k = 2) of a week's energy, %. */
function expandedPercent(of: MeterPlate, meanPowerKw: number | null): number | undefined {
  return combinePeriod(budgetFromPlate(of, meanPowerKw, []), {
    figure: "energy",
    value: 5000,
    flowWeightedDeltaTK: null,
    deltaTWeightedVelocityMPerS: null,
    meanVelocityMPerS: null,
    samples: 672,
    flowSpreadM3PerHour: null,
    deltaTSpreadK: null,
  })?.expandedPercent;
}

// By hand, limits after EN 1434-1, from memory; structure after Directive 2014/32/EU, Annex VI. At
// q = q_p/10 and Δθ = Δθ_min: E_f = 1 + 0.01·10, 2 + 0.02·10, 3 + 0.05·10; E_t = 0.5 + 3 = 3.5;
// E_c = 0.5 + 1 = 1.5. U = 2·E/√3.
test.each([
  { accuracyClass: 1, flow: 1.1, total: 6.1, U: 7.043673 },
  { accuracyClass: 2, flow: 2.2, total: 7.2, U: 8.313844 },
  { accuracyClass: 3, flow: 3.5, total: 8.5, U: 9.814955 },
] as const)(
  "class $accuracyClass with nothing else known stands at its least state: $U %",
  ({ accuracyClass, flow, total, U }) => {
    const [term] = budgetFromPlate(plate({ accuracyClass }), 40, []).terms;
    expect(term).toMatchObject({ kind: "meterLimits", distribution: "rectangular" });
    expect(term?.given).toBeCloseTo(total, 10);
    expect(term?.origin.code).toBe("meterClassLeastState");
    const { flowPercent, pairPercent, calculatorPercent } = term?.origin.values ?? {};
    expect([flowPercent, pairPercent, calculatorPercent]).toEqual([flow, 3.5, 1.5]);
    // It does not shrink with the number of readings.
    expect(expandedPercent(plate({ accuracyClass }), 40)).toBeCloseTo(U, 6);
  },
);

// q_p 10 m³/h, Δθ_min 3 K, 150 kW: Δθ ≥ 150/(1.175·10) = 12.765957 K; E_t = 0.5 + 3·3/12.765957 =
// 1.205; E_c = 0.5 + 3/12.765957 = 0.735; E_f = 2.2; together 4.14 %, U = 4.780460 %.
test("power and the permanent flow bound ΔT from below, which narrows the limits", () => {
  const known = plate({ permanentFlowM3PerHour: 10, minimumDeltaTK: 3 });
  const [term] = budgetFromPlate(known, 150, []).terms;
  expect(term?.given).toBeCloseTo(4.14, 10);
  expect(term?.origin.code).toBe("meterClassByPower");
  expect(term?.origin.values.leastDeltaTK).toBeCloseTo(12.765957, 6);
  expect(expandedPercent(known, 150)).toBeCloseTo(4.78046, 5);
});

test("a small power bounds nothing: ΔT stays at the least the meter is made for", () => {
  const known = plate({ permanentFlowM3PerHour: 10, minimumDeltaTK: 3 });
  // 35.25 kW at 10 m³/h is 3 K just so.
  expect(leastState(known, 35)).toMatchObject({ deltaTRatio: 1, deltaTFrom: "least" });
  expect(leastState(known, 36).deltaTFrom).toBe("powerAndPermanentFlow");
  expect(leastState(known, null).deltaTRatio).toBe(1);
  expect(leastState({ ...known, minimumDeltaTK: null }, 150).deltaTRatio).toBe(1);
});

test("the meter's own certificate counts before its class", () => {
  const certified = plate({ certificate: { number: "K-7", expandedPercent: 1.5, k: 2 } });
  expect(expandedPercent(certified, 40)).toBeCloseTo(1.5, 10);
  const [term] = budgetFromPlate(certified, 40, []).terms;
  expect(term?.origin.code).toBe("meterOwnCertificate");
});

test("the class is on record, the state is not: that is part evidence, part usual values", () => {
  expect(budgetBasis(budgetFromPlate(plate(), 40, []))).toBe("partlyDefaults");
  const certified = plate({ certificate: { number: "K-7", expandedPercent: 1.5, k: 2 } });
  expect(budgetBasis(budgetFromPlate(certified, 40, []))).toBe("evidence");
});

test("limits set by hand replace the class's, and say why", () => {
  const edit = { kind: "meterLimits", value: 3, reason: "verified in place" } as const;
  const [term] = budgetFromPlate(plate(), 40, [edit]).terms;
  expect(term).toMatchObject({ given: 3, unit: "%", origin: { from: "edited" } });
});
