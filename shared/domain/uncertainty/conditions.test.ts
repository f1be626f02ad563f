import type { Verdict } from "@shared/contracts/evidence";
import { WORKED_EVIDENCE, WORKED_INPUT } from "@test/reference/uncertainty-worked-interval";
import { budgetFromEvidence } from "./budget-from-evidence";
import { type ConditionsInput, conditionVerdicts } from "./conditions";
import { deltaTStandardK } from "./conditions-of-pair";
import type { PointEvidence } from "./point-evidence";
import type { ConditionVerdict } from "./verdict";

const budget = budgetFromEvidence(WORKED_INPUT);
const GOOD: ConditionsInput = {
  evidence: {
    ...WORKED_EVIDENCE,
    straightRun: { upstreamM: 1.2, downstreamM: 0.61, nearestFitting: "bend" },
  },
  budget,
  fluid: { kind: "water" },
  state: { velocityMPerS: 0.96, reynolds: 78_000, deltaTK: 5.9 },
  enteredBoreMm: 102.97,
  enteredBoreCorrected: false,
  onDate: "2026-06-20",
  intervalS: 300,
  pairDifferenceCorrected: true,
  completeness: 0.995,
};

function verdictsOf(
  check: ConditionVerdict["check"],
  changed: Partial<ConditionsInput> = {},
  evidence: Partial<PointEvidence> = {},
): ConditionVerdict[] {
  const input = { ...GOOD, ...changed };
  const all = conditionVerdicts({
    ...input,
    evidence: input.evidence && { ...input.evidence, ...evidence },
  });
  return all.filter((verdict) => verdict.check === check);
}
const codesOf = (...asked: Parameters<typeof verdictsOf>) =>
  verdictsOf(...asked).map((verdict) => verdict.code);

test("a good installation is fine in every check, once each", () => {
  const verdicts = conditionVerdicts(GOOD);
  expect(verdicts.filter((verdict) => verdict.weight !== "fine")).toEqual([]);
  expect(verdicts.map((verdict) => verdict.check).sort()).toEqual(
    ["bathCheck", "bore", "certificate", "clock", "completeness", "deltaT", "mounting"]
      .concat(["reynolds", "soundSpeed", "straightRun", "velocity", "zero"])
      .sort(),
  );
});

test("a failed check always widens a term or bars a use, and a good one does neither", () => {
  const worst = conditionVerdicts({
    ...GOOD,
    evidence: null,
    fluid: { kind: "propyleneGlycol", percent: 30, basis: "mass" },
    state: { velocityMPerS: 0.1, reynolds: 3000, deltaTK: 0.2 },
    completeness: 0.5,
  });
  expect(worst.length).toBeGreaterThanOrEqual(12);
  for (const verdict of [...worst, ...conditionVerdicts(GOOD)]) {
    if (verdict.weight === "fine") expect(verdict.adds).toBeNull();
    if (verdict.weight === "look") expect(verdict.adds?.kind).toBe("term");
    if (verdict.weight === "stop") expect(verdict.adds?.kind).toBe("block");
  }
  expect(worst.every((verdict) => verdict.weight !== "fine")).toBe(true);
});

test("a verdict fits what the API hands out", () => {
  const verdict: Verdict = verdictsOf("velocity")[0]!;
  expect(verdict.check).toBe("velocity");
});

test("speed from 0.3 m/s, either way; unknown gives no verdict", () => {
  const state = (velocityMPerS: number | null) => ({ state: { ...GOOD.state, velocityMPerS } });
  expect(codesOf("velocity", state(-0.3))).toEqual(["velocityFine"]);
  expect(codesOf("velocity", state(0.299))).toEqual(["velocityLow"]);
  expect(codesOf("velocity", state(null))).toEqual([]);
});

test("a Reynolds number of 10 000 is not above it", () => {
  const state = (reynolds: number) => ({ state: { ...GOOD.state, reynolds } });
  expect(codesOf("reynolds", state(10_000))).toEqual(["reynoldsLow"]);
  expect(codesOf("reynolds", state(10_001))).toEqual(["reynoldsFine"]);
});

test("ΔT must be ten times its own uncertainty", () => {
  const standardK = deltaTStandardK(budget);
  expect(standardK).toBeCloseTo(0.070356, 6);
  const state = (deltaTK: number) => ({ state: { ...GOOD.state, deltaTK } });
  expect(codesOf("deltaT", state(-0.71))).toEqual(["deltaTFine"]);
  expect(codesOf("deltaT", state(0.7))).toEqual(["deltaTSmall"]);
});

test("a sound speed more than 1 % off bars the use; glycol has no formula and no verdict", () => {
  const shown = (displayedMPerS: number) =>
    verdictsOf("soundSpeed", {}, { soundSpeed: { displayedMPerS, fluidC: 20 } })[0];
  // 1482.38 m/s: Marczak 1997 at 20 °C.
  expect(shown(1482.38 * 1.0099)?.code).toBe("soundSpeedPlausible");
  expect(shown(1482.38 * 1.0101)).toMatchObject({
    weight: "stop",
    adds: { kind: "block", blocks: "use" },
  });
  const glycol = { kind: "ethyleneGlycol", percent: 30, basis: "mass" } as const;
  expect(codesOf("soundSpeed", { fluid: glycol })).toEqual([]);
});

test("straight runs are judged on both sides and never block", () => {
  const run = (upstreamM: number, downstreamM: number) =>
    codesOf(
      "straightRun",
      {},
      {
        straightRun: { upstreamM, downstreamM, nearestFitting: "bend" },
      },
    );
  expect(run(1.03, 0.52)).toEqual(["straightRunFine"]);
  expect(run(1.02, 0.52)).toEqual(["straightRunUpstreamShort"]);
  expect(run(0.1, 0.1)).toEqual(["straightRunUpstreamShort", "straightRunDownstreamShort"]);
  expect(codesOf("straightRun", {}, { straightRun: null })).toEqual(["straightRunUnknown"]);
  expect(codesOf("straightRun", { budget: { ...budget, boreMm: null } })).toEqual([
    "straightRunUnknown",
  ]);
});

test("a zero is proven, left or unproven", () => {
  const zero = WORKED_EVIDENCE.zero!;
  expect(codesOf("zero")).toEqual(["zeroProven"]);
  expect(codesOf("zero", {}, { zero: { ...zero, flowStopped: false } })).toEqual(["zeroUnproven"]);
  expect(codesOf("zero", {}, { zero: { ...zero, action: "none" } })).toEqual(["zeroReadingLeft"]);
  expect(codesOf("zero", {}, { zero: null })).toEqual(["zeroUnproven"]);
});

test("few or uneven wall readings widen the bore; another bore in the meter bars billing", () => {
  const pipe = WORKED_EVIDENCE.pipe!;
  expect(codesOf("bore", {}, { pipe: { ...pipe, wallReadingsMm: [5.6, 5.7, 5.7] } })).toEqual([
    "boreFewWallReadings",
  ]);
  expect(codesOf("bore", {}, { pipe: { ...pipe, wallReadingsMm: [5, 5.6, 5.6, 5.7] } })).toEqual([
    "boreWallSpread",
  ]);
  expect(codesOf("bore", {}, { pipe: null })).toEqual(["boreNotMeasured"]);
  const [nominal] = verdictsOf("bore", { enteredBoreMm: 102.26 });
  expect(nominal).toMatchObject({
    code: "boreEnteredDiffers",
    adds: { kind: "block", blocks: "billing" },
  });
  expect(nominal?.values["flowPercent"]).toBeCloseTo(1.3837, 4);
  expect(codesOf("bore", { enteredBoreMm: 102.26, enteredBoreCorrected: true })).toEqual([
    "boreMeasured",
  ]);
});

test("a bath check must be there, of these probes, and taken off the readings", () => {
  const check = WORKED_EVIDENCE.bathCheck!;
  expect(codesOf("bathCheck", {}, { bathCheck: null })).toEqual(["bathCheckMissing"]);
  expect(codesOf("bathCheck", {}, { bathCheck: { ...check, firstSerial: "T-7" } })).toEqual([
    "bathCheckOtherProbes",
  ]);
  expect(codesOf("bathCheck", { pairDifferenceCorrected: false })).toEqual([
    "bathCheckFine",
    "bathCheckNotCorrected",
  ]);
});

test("probes mounted unequally or bare are worth a look", () => {
  const probes = WORKED_EVIDENCE.probes!;
  const supply = (changed: object) =>
    codesOf("mounting", {}, { probes: { ...probes, supply: { ...probes.supply, ...changed } } });
  expect(supply({ mounting: "pocket" })).toEqual(["mountingUnequal"]);
  expect(supply({ insulated: false })).toEqual(["mountingUninsulated"]);
  expect(supply({})).toEqual(["mountingFine"]);
});

test("a certificate holds through its due day, warns thirty days before and then bars billing", () => {
  const on = (onDate: string) => codesOf("certificate", { onDate });
  expect(on("2026-12-12")).toEqual(["certificateInDate"]);
  expect(on("2026-12-13")).toEqual(["certificateDueSoon"]);
  expect(on("2027-01-12")).toEqual(["certificateDueSoon"]);
  expect(on("2027-01-13")).toEqual(["certificateLapsed"]);
  expect(verdictsOf("certificate", { onDate: "2027-01-13" })[0]?.adds).toEqual({
    kind: "block",
    blocks: "billing",
  });
});

test("a clock may be off by less than half an interval", () => {
  const clocks = (startOffsetS: number) => ({
    clocks: [{ loggerSerial: "L-1", startOffsetS, endOffsetS: null }],
  });
  expect(codesOf("clock", {}, clocks(-149))).toEqual(["clockFine"]);
  expect(codesOf("clock", {}, clocks(150))).toEqual(["clockOff"]);
  expect(codesOf("clock", {}, { clocks: [] })).toEqual(["clockUnchecked"]);
  expect(codesOf("clock", { intervalS: null })).toEqual([]);
});

test("a mixture must have been tested within a year; water need not", () => {
  const fluid = { kind: "propyleneGlycol", percent: 30, basis: "mass" } as const;
  const tested = (fluidTestedOn: string | null) => codesOf("fluid", { fluid }, { fluidTestedOn });
  expect(tested("2025-06-20")).toEqual(["fluidTested"]);
  expect(tested("2025-06-19")).toEqual(["fluidTestOld"]);
  expect(tested(null)).toEqual(["fluidNotTested"]);
  expect(codesOf("fluid")).toEqual([]);
});

test("completeness bills from 99 %, with its fill shown from 95 %, and not below", () => {
  const at = (completeness: number | null) => codesOf("completeness", { completeness });
  expect(at(0.99)).toEqual(["completenessFine"]);
  expect(at(0.9899)).toEqual(["completenessFilled"]);
  expect(at(0.95)).toEqual(["completenessFilled"]);
  expect(at(0.9499)).toEqual(["completenessLow"]);
  expect(at(null)).toEqual([]);
});
