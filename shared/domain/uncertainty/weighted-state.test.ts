import { weightedState } from "./weighted-state";

const REGISTER = {
  energyKwh: 580,
  volumeM3: 100,
  flowDeltaTM3K: 500,
  powerDeltaTKwhK: 2900,
  deltaTKs: 72_000,
  runningS: 14_400,
};

test("a register's sums give the means that offsets work through", () => {
  const state = weightedState(REGISTER, 100);
  expect(state.flowWeightedDeltaTK).toBe(5);
  expect(state.deltaTWeightedVelocityMPerS).toBeCloseTo(0.8842, 4);
  expect(state.meanVelocityMPerS).toBeCloseTo(0.8842, 4);
  expect(state.meanFlowM3PerHour).toBeCloseTo(25, 12);
});

test("a register that did not run and an unknown bore are unknown, not 0", () => {
  const still = { ...REGISTER, volumeM3: 0, flowDeltaTM3K: 0, deltaTKs: 0, runningS: 0 };
  expect(weightedState(still, 100)).toEqual({
    flowWeightedDeltaTK: null,
    deltaTWeightedVelocityMPerS: null,
    meanVelocityMPerS: null,
    meanFlowM3PerHour: null,
  });
  expect(weightedState(REGISTER, null)).toMatchObject({
    deltaTWeightedVelocityMPerS: null,
    meanVelocityMPerS: null,
    meanFlowM3PerHour: 25,
  });
});
