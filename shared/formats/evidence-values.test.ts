import { evidenceValues } from "./evidence-values";
import { makeFormat } from "./format";

const say = (key: string) => `[${key}]`;
const plain = (values: Record<string, string | number>, system: "si" | "inchPound" = "si") => {
  const shown = evidenceValues(values, makeFormat("en", system, "UTC"), say);
  return Object.fromEntries(
    Object.entries(shown).map(([name, text]) => [name, text.replace(/\u00a0/g, " ")]),
  );
};

it("what was measured has its places and unit, what was chosen the decimals it has", () => {
  expect(
    plain({
      upstreamBores: 8.935068,
      advisedUpstream: 10,
      deviationPercent: -4.337892,
      limitPercent: 1,
      leastMPerS: 0.3,
      k: 2,
      meanDifferenceK: 0.11,
    }),
  ).toEqual({
    upstreamBores: "8.935 D",
    advisedUpstream: "10 D",
    deviationPercent: "−4.34 %",
    limitPercent: "1 %",
    leastMPerS: "0.3 m/s",
    k: "2",
    meanDifferenceK: "0.110 K",
  });
});

it("follows the reader's unit system, writes days out and puts codes into words", () => {
  expect(
    plain({ boreMm: 102.9651, checkedOn: "2026-02-20", fitting: "bend" }, "inchPound"),
  ).toEqual({ boreMm: "4.05 in", checkedOn: "20 Feb 2026", fitting: "[fitting.bend]" });
});
