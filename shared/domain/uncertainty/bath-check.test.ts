import { bathCheck, bathCheckVerdicts } from "./bath-check";

const FOUR = [4.1, 4.12, 4.11, 4.11].map((firstC) => ({ firstC, secondC: 4 }));

test("paired readings give a mean difference, its spread and what is left once it is taken off", () => {
  const result = bathCheck(FOUR, 0.01);
  expect(result?.pairs).toBe(4);
  expect(result?.meanDifferenceK).toBeCloseTo(0.11, 12);
  expect(result?.deviationK).toBeCloseTo(0.00816497, 8);
  expect(result?.residualK).toBeCloseTo(0.0108012, 7);
  expect(result?.bathC).toBeCloseTo(4.055, 12);
  expect(result?.driftK).toBeNull();
});

test("a bath that is the same everywhere leaves the spread of the mean alone", () => {
  expect(bathCheck(FOUR, 0)?.residualK).toBeCloseTo(0.00816497 / 2, 8);
});

test("drift is the change since the check before, with its sign", () => {
  expect(bathCheck(FOUR, 0.01, { meanDifferenceK: 0.15 })?.driftK).toBeCloseTo(-0.04, 12);
});

test("one pair has no spread and gives no result", () => {
  expect(bathCheck(FOUR.slice(0, 1), 0.01)).toBeNull();
});

const GOOD = { pairs: 10, checkedOn: "2026-06-01", meanDifferenceK: 0.3, driftK: 0.05 };
const codes = (check: Parameters<typeof bathCheckVerdicts>[0], onDate = "2026-07-01") =>
  bathCheckVerdicts(check, onDate).map((verdict) => verdict.code);

test("a check at every limit is fine", () => {
  expect(codes(GOOD)).toEqual(["bathCheckFine"]);
  // 0.35 − 0.30 is not quite 0.05 in binary; that is no drift above 0.05 K.
  expect(codes({ ...GOOD, driftK: 0.35 - 0.3 })).toEqual(["bathCheckFine"]);
});

test("too few pairs, an old check, a large mean and a drift are each worth a look", () => {
  expect(codes({ ...GOOD, pairs: 9 })).toEqual(["bathCheckFewPairs"]);
  expect(codes(GOOD, "2026-07-02")).toEqual(["bathCheckOld"]);
  expect(codes(GOOD, "2026-05-01")).toEqual(["bathCheckOld"]);
  expect(codes({ ...GOOD, meanDifferenceK: -0.31 })).toEqual(["bathCheckMeanLarge"]);
  expect(codes({ ...GOOD, driftK: -0.06 })).toEqual(["bathCheckDrift"]);
  expect(codes({ ...GOOD, driftK: null })).toEqual(["bathCheckFine"]);
  const all = { pairs: 3, checkedOn: "2026-01-01", meanDifferenceK: 1, driftK: 0.2 };
  for (const verdict of bathCheckVerdicts(all, "2026-07-01")) {
    expect(verdict.weight).toBe("look");
    expect(verdict.adds?.kind).toBe("term");
  }
  expect(codes(all)).toHaveLength(4);
});
