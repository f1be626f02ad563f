import {
  suggestedDeltaTCutOffK,
  suggestedFlowCutOff,
  uncheckedPairUncertaintyK,
} from "./cut-off-suggestions";

test("an unchecked class B pair at 6.9 and 12.8 °C is uncertain by 0.285416 K", () => {
  // Limits of IEC 60751 class B, rectangular, both probes independent; computed by hand.
  expect(uncheckedPairUncertaintyK(6.9, 12.8)).toBeCloseTo(0.285416, 6);
});

test("suggestions follow the design flow and the temperatures of the service", () => {
  expect(suggestedFlowCutOff(null)).toBeNull();
  expect(suggestedFlowCutOff(45)).toBeCloseTo(0.9, 12);
  expect(suggestedDeltaTCutOffK("chilled")).toBe(0.6);
  expect(suggestedDeltaTCutOffK("hot")).toBe(1.1);
});
