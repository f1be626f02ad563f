import { WORKED_EVIDENCE, WORKED_INPUT } from "@test/reference/uncertainty-worked-interval";
import { budgetBasis } from "./budget-basis";
import { budgetFromEvidence, type BudgetInput } from "./budget-from-evidence";
import type { BudgetTerm } from "./budget";
import type { BudgetTermKind, PointEvidence } from "./point-evidence";

function term(
  kind: BudgetTermKind,
  evidence: Partial<PointEvidence> = {},
  input: Partial<BudgetInput> = {},
): BudgetTerm {
  const budget = budgetFromEvidence({
    ...WORKED_INPUT,
    evidence: { ...WORKED_EVIDENCE, ...evidence },
    ...input,
  });
  const found = budget.terms.filter((each) => each.kind === kind);
  expect(found).toHaveLength(1);
  return found[0]!;
}

const { flowMeter, probes, bathCheck, pipe, straightRun, zero } = WORKED_EVIDENCE;
const meter = flowMeter!;
const pair = probes!;
const check = bathCheck!;

test("nothing on record still gives a budget, every recorded term a wide default", () => {
  const budget = budgetFromEvidence({
    evidence: null,
    pipe: null,
    fluid: null,
    fluidHeatPercent: 0,
    meterSide: "return",
    onDate: "2026-06-20",
    state: null,
  });
  expect(budget.boreMm).toBeNull();
  expect(budgetBasis(budget)).toBe("defaults");
  const worked = budgetFromEvidence(WORKED_INPUT);
  expect(budgetBasis(worked)).toBe("evidence");
  for (const each of budget.terms) {
    expect(each.origin.from).toBe("default");
    const known = worked.terms.find((other) => other.kind === each.kind);
    if (known?.unit === each.unit) {
      expect(each.standard).toBeGreaterThanOrEqual(known.standard);
    }
  }
  // Without a bore no speed can be told, so the zero is put in per cent.
  expect(budget.terms.find((each) => each.kind === "zero")).toMatchObject({
    unit: "%",
    given: 2,
    origin: { code: "zeroWithoutBore" },
  });
});

test("a lapsed certificate counts twice, from the day after it was due", () => {
  const input = { onDate: "2027-01-12" };
  expect(term("certificate", {}, input).origin.code).toBe("certificateInDate");
  const lapsed = term("certificate", {}, { onDate: "2027-01-13" });
  expect(lapsed).toMatchObject({ given: 2, standard: 1, origin: { code: "certificateLapsed" } });
});

test("no certificate is worse than a lapsed one, and one without a due day does not lapse", () => {
  const none = term("certificate", { flowMeter: { ...meter, certificate: null } });
  expect(none).toMatchObject({
    standard: 2,
    origin: { from: "default", code: "certificateMissing" },
  });
  const open = { ...meter.certificate!, dueOn: null };
  expect(
    term("certificate", { flowMeter: { ...meter, certificate: open } }, { onDate: "2031-01-01" }),
  ).toMatchObject({ standard: 0.5 });
  const k3 = { ...meter.certificate!, expanded: 1.5, k: 3 };
  expect(term("certificate", { flowMeter: { ...meter, certificate: k3 } }).standard).toBe(0.5);
});

test("a bore from a table is worth the mill tolerance, a measured one its own readings", () => {
  const table = term("bore", { pipe: null });
  // NPS 4 schedule 40: √((1.143/√3)² + 4·(0.7525/√3)²) mm.
  expect(table.standard).toBeCloseTo(Math.sqrt((1.143 ** 2 + 4 * 0.7525 ** 2) / 3), 9);
  expect(table.origin).toMatchObject({ from: "default", code: "boreFromTable" });
  const one = term("bore", { pipe: { ...pipe!, wallReadingsMm: [5.67] } });
  expect(one.origin.code).toBe("boreOneWallReading");
  const many = term("bore");
  expect(many.standard).toBeCloseTo(0.2270095, 7);
  expect(one.standard).toBeGreaterThan(3 * many.standard);
  expect(one.standard).toBeLessThan(table.standard);
});

test("a pipe whose walls leave no bore falls back on its nominal size", () => {
  const budget = budgetFromEvidence({
    ...WORKED_INPUT,
    evidence: { ...WORKED_EVIDENCE, pipe: { ...pipe!, wallReadingsMm: [60, 60] } },
  });
  expect(budget.boreMm).toBeCloseTo(102.26, 9);
});

test("the velocity profile widens as the straight run shortens, up to the published 10.8 %", () => {
  const at = (upstreamM: number, downstreamM = 1) =>
    term("profile", { straightRun: { ...straightRun!, upstreamM, downstreamM } }).given;
  expect(at(3)).toBe(1);
  expect(at(0.92)).toBe(2);
  expect(at(0.83)).toBe(2);
  expect(at(0.62)).toBeGreaterThan(5);
  expect(at(0.1)).toBeCloseTo(10.8, 9);
  expect(at(0)).toBeCloseTo(10.8, 9);
  expect(at(0.92, 0.2)).toBeGreaterThan(at(0.92, 0.6));
  const pump = { ...straightRun!, upstreamM: 0.92, nearestFitting: "pump" } as const;
  expect(term("profile", { straightRun: pump }).given).toBeGreaterThan(2);
  const none = { ...straightRun!, upstreamM: 0, nearestFitting: "none" } as const;
  expect(term("profile", { straightRun: none }).given).toBe(1);
  expect(term("profile", { straightRun: null })).toMatchObject({
    given: 5,
    origin: { from: "default", code: "profileUnknownRun" },
  });
});

test("flow that is not fully turbulent widens the profile", () => {
  const slow = (velocityMPerS: number) =>
    term("profile", {}, { state: { supplyC: 6.9, returnC: 12.8, velocityMPerS } });
  expect(slow(0.96).given).toBe(2);
  expect(slow(0.1)).toMatchObject({ given: 4, origin: { code: "profileLowReynolds" } });
  expect(slow(0.03).given).toBe(10);
  // Standing water has no profile to be wrong about.
  expect(slow(0).given).toBe(2);
});

test("a zero that was not proven on standing water keeps at least ±0.010 m/s", () => {
  const unproven = { flowStopped: false, readingMPerS: 0, remainingMPerS: 0.002 } as const;
  expect(term("zero", { zero: { ...unproven, action: "setOnMeter" } })).toMatchObject({
    given: 0.01,
    origin: { from: "default", code: "zeroUnproven" },
  });
  expect(term("zero", { zero: null }).given).toBe(0.01);
  expect(term("zero", { zero: { ...unproven, remainingMPerS: 0.03, action: "none" } }).given).toBe(
    0.03,
  );
  expect(term("zero", { zero: { ...zero!, remainingMPerS: 0.002 } }).given).toBe(0.002);
  expect(term("zero", { zero: { ...zero!, remainingMPerS: null } }).given).toBe(0.01);
});

test("a zero that was read and left stays as wide as it was read", () => {
  const left = { ...zero!, readingMPerS: -0.03, remainingMPerS: null, action: "none" } as const;
  expect(term("zero", { zero: left })).toMatchObject({
    given: 0.03,
    origin: { code: "zeroReadingLeft" },
  });
});

test("a meter mounted only once is worth 1 %", () => {
  expect(term("remount", { remountPercent: null })).toMatchObject({ standard: 1, unit: "%" });
});

test("a check of other probes is no check, and of swapped ones it is", () => {
  const other = term("probePair", { bathCheck: { ...check, secondSerial: "T-9" } });
  expect(other.origin.code).toBe("pairFromClass");
  expect(other.standard).toBeCloseTo(0.285416, 6);
  const swapped = { ...pair, supply: pair.return, return: pair.supply };
  expect(term("probePair", { probes: swapped }).standard).toBe(0.03);
});

test("without a check there is no drift to speak of, and an unknown class counts as B", () => {
  const unknown = { ...pair.supply, probeClass: null };
  const budget = budgetFromEvidence({
    ...WORKED_INPUT,
    evidence: { ...WORKED_EVIDENCE, bathCheck: null, probes: { ...pair, supply: unknown } },
  });
  expect(budget.terms.some((each) => each.kind === "pairDrift")).toBe(false);
  expect(budget.terms.find((each) => each.kind === "probePair")).toMatchObject({
    origin: { from: "default", code: "pairClassAssumed" },
  });
});

test("an old check, few pairs and a large difference each widen the pair", () => {
  expect(term("pairDrift", {}, { onDate: "2026-07-02" }).given).toBe(0.03);
  expect(term("pairDrift", {}, { onDate: "2026-07-03" })).toMatchObject({
    given: 0.06,
    origin: { code: "pairDriftOldCheck" },
  });
  expect(term("pairDrift", { bathCheck: { ...check, driftK: -0.08 } }).given).toBe(0.08);
  expect(term("pairDrift", { bathCheck: { ...check, driftK: 0 } }).given).toBe(0.01);
  expect(term("pairDrift", { bathCheck: { ...check, driftK: null } })).toMatchObject({
    given: 0.03,
    origin: { from: "default", code: "pairDriftAssumed" },
  });
  // Student's t for 4 degrees of freedom is 2.87 where a normal distribution has 2.
  const few = term("probePair", { bathCheck: { ...check, pairs: 5 } });
  expect(few.standard).toBeCloseTo(0.03 * (2.87 / 2), 12);
  expect(few.origin.code).toBe("pairFewReadings");
  const large = term("probePair", { bathCheck: { ...check, meanDifferenceK: 0.4 } });
  expect(large.standard).toBeCloseTo(0.05, 12);
});

test("a difference nobody took off the readings stays in them", () => {
  const left = term("probePair", {}, { pairDifferenceCorrected: false });
  expect(left.standard).toBeCloseTo(Math.hypot(0.03, 0.14), 12);
  expect(left.origin.code).toBe("pairNotCorrected");
});

test("unequal mounting and bare surface probes are wider than stated, a pair alike is not", () => {
  const pocket = { ...pair.supply, mounting: "pocket" } as const;
  const bare = { ...pair.supply, insulated: false };
  const given = (changed: Partial<typeof pair>) =>
    term("mounting", { probes: { ...pair, ...changed } }).given;
  expect(given({})).toBe(0.1);
  expect(given({ supply: pocket })).toBe(0.3);
  expect(given({ supply: bare })).toBe(0.5);
  expect(given({ supply: bare, mountingK: 0.8 })).toBe(0.8);
  expect(given({ mountingK: null })).toBe(0.1);
  const pockets = { supply: pocket, return: { ...pair.return, mounting: "pocket" } } as const;
  expect(given({ ...pockets, mountingK: null })).toBe(0.05);
  expect(term("mounting", { probes: null }).origin.code).toBe("mountingUnknown");
});

test("a mixture adds its own term, wider when its test is old and widest when there is none", () => {
  const mixed = (fluidTestedOn: string | null) =>
    term("fluid", { fluidTestedOn }, { fluidHeatPercent: 0.4 }).standard;
  expect(mixed("2026-01-01")).toBe(0.4);
  expect(mixed("2025-01-01")).toBeCloseTo(0.6, 12);
  expect(mixed(null)).toBe(0.8);
  const water = budgetFromEvidence(WORKED_INPUT);
  expect(water.terms.some((each) => each.kind === "fluid")).toBe(false);
});

test("a logger's clock off by more than half an interval widens the alignment in proportion", () => {
  const off = (endOffsetS: number) =>
    term("alignment", { clocks: [{ loggerSerial: "L-1", startOffsetS: 0, endOffsetS }] }).standard;
  expect(off(150)).toBe(0.3);
  expect(off(-300)).toBeCloseTo(0.6, 12);
});

test("an edit replaces the value and keeps unit and distribution", () => {
  const edits = [{ kind: "mounting", value: 0.2, reason: "new pockets" }] as const;
  const edited = term("mounting", { edits });
  expect(edited).toMatchObject({
    given: 0.2,
    unit: "K",
    distribution: "rectangular",
    origin: { from: "edited", code: "edited", values: { reason: "new pockets", before: 0.1 } },
  });
  expect(edited.standard).toBeCloseTo(0.2 / Math.sqrt(3), 12);
  const step = [{ kind: "deltaTStep", value: 0.1, reason: "other logger" }] as const;
  expect(term("deltaTStep", { edits: step }).standard).toBeCloseTo(0.1 / Math.sqrt(6), 12);
});

test("an edit of a term that was not there adds it in the shape its kind has", () => {
  const edits = [{ kind: "fluid", value: 0.7, reason: "two samples" }] as const;
  expect(term("fluid", { edits })).toMatchObject({ standard: 0.7, unit: "%", actsOn: "heat" });
});

test("the density is taken where the flow meter sits", () => {
  const hot = { supplyC: 70, returnC: 40, velocityMPerS: 1 };
  const onReturn = term("density", {}, { state: hot, meterSide: "return" });
  const onSupply = term("density", {}, { state: hot, meterSide: "supply" });
  expect(onSupply.standard).toBeGreaterThan(onReturn.standard);
});

test("a temperature at which the fluid is not liquid takes the density's widest term", () => {
  const frozen = { supplyC: 6, returnC: -20, velocityMPerS: null };
  const unknown = term("density", {}, { state: null });
  expect(term("density", {}, { state: frozen }).standard).toBe(unknown.standard);
  expect(unknown.standard).toBeGreaterThan(term("density").standard);
});

test("one default among the recorded terms makes the whole rest on defaults in part", () => {
  const evidence = { ...WORKED_EVIDENCE, remountPercent: null };
  expect(budgetBasis(budgetFromEvidence({ ...WORKED_INPUT, evidence }))).toBe("partlyDefaults");
  const nearly = { ...WORKED_INPUT, evidence: null, pipe: null };
  const edits = [{ kind: "zero", value: 0.01, reason: "valve shut" }] as const;
  const edited = { ...WORKED_EVIDENCE, edits, remountPercent: 0.4 };
  expect(budgetBasis(budgetFromEvidence(nearly))).toBe("defaults");
  expect(budgetBasis(budgetFromEvidence({ ...WORKED_INPUT, evidence: edited }))).toBe("evidence");
});
