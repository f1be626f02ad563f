import { agreement } from "./agreement";
import { agreementByFlow, meterLine } from "./agreement-by-flow";

test("figures a whole joint uncertainty apart still agree, a hair more and they do not", () => {
  expect(agreement({ value: 105, expanded: 3 }, { value: 100, expanded: 4 })).toMatchObject({
    difference: 5,
    differencePercent: 5,
    en: 1,
    code: "agree",
  });
  expect(agreement({ value: 94.99, expanded: 3 }, { value: 100, expanded: 4 }).code).toBe(
    "disagree",
  );
});

test("without both uncertainties nothing is decided", () => {
  const known = { value: 100, expanded: 1 };
  const unknown = { value: 150, expanded: null };
  for (const found of [agreement(known, unknown), agreement(unknown, known)]) {
    expect(found).toMatchObject({ en: null, code: "inconclusive" });
    expect(found.ratio?.expanded).toBeNull();
  }
  const exact = { value: 1, expanded: 0 };
  expect(agreement(exact, exact).code).toBe("inconclusive");
});

test("the ratio comes with its interval", () => {
  const { ratio } = agreement({ value: 110, expanded: 3.3 }, { value: 100, expanded: 4 });
  expect(ratio?.value).toBeCloseTo(1.1, 12);
  expect(ratio?.expanded).toBeCloseTo(1.1 * 0.05, 12);
  expect(agreement({ value: 1, expanded: 1 }, { value: 0, expanded: 1 })).toMatchObject({
    ratio: null,
    differencePercent: null,
  });
  expect(agreement({ value: 0, expanded: 1 }, { value: 10, expanded: 1 }).ratio).toEqual({
    value: 0,
    expanded: 0.1,
  });
});

test("a good total that hides a high and a low band is flagged", () => {
  const bands = [
    {
      fromM3PerHour: 0,
      toM3PerHour: 10,
      first: { value: 130, expanded: 10 },
      second: { value: 100, expanded: 11 },
    },
    {
      fromM3PerHour: 10,
      toM3PerHour: null,
      first: { value: 370, expanded: 15 },
      second: { value: 400, expanded: 13 },
    },
  ];
  const total = { first: { value: 500, expanded: 20 }, second: { value: 500, expanded: 20 } };
  const found = agreementByFlow(total, bands);
  expect(found.total.code).toBe("agree");
  expect(found.bands.map((band) => band.agreement.code)).toEqual(["disagree", "disagree"]);
  expect(found.compensating).toBe(true);
  const calm = bands.map((band) => ({ ...band, first: band.second }));
  expect(agreementByFlow(total, calm).compensating).toBe(false);
  const bad = { ...total, first: { value: 700, expanded: 20 } };
  expect(agreementByFlow(bad, bands).compensating).toBe(false);
});

test("slope and intercept tell an error of scale from one of zero", () => {
  const readings = [1, 2, 3].map((second) => ({ first: second + 0.1, second }));
  expect(meterLine(readings)?.slope).toBeCloseTo(1, 12);
  expect(meterLine(readings)?.intercept).toBeCloseTo(0.1, 12);
  const scaled = [1, 2, 5].map((second) => ({ first: 1.03 * second, second }));
  expect(meterLine(scaled)?.slope).toBeCloseTo(1.03, 12);
  expect(meterLine(readings.slice(0, 1))).toBeNull();
  expect(meterLine([readings[0]!, readings[0]!])).toBeNull();
});
