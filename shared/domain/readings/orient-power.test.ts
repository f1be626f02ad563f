import { orientPower } from "./orient-power";

const none = { supplyC: null, returnC: null };
const power = Float64Array.of(40, -2, 0);

test("a heating meter's power stays, a cooling meter's changes its sign, an unknown one's is unknown", () => {
  expect([...orientPower(power, "heating", none)]).toEqual([40, -2, 0]);
  expect([...orientPower(power, "cooling", none)]).toEqual([-40, 2, 0]);
  expect([...orientPower(power, null, none)]).toEqual([NaN, NaN, NaN]);
});

test("by temperature, warmer supply is heating; what contradicts itself is unknown", () => {
  const temperatures = {
    supplyC: Float64Array.of(45, 7, 45, 7, 20, NaN, 20),
    returnC: Float64Array.of(40, 12, 40, 12, 20, 12, 20),
  };
  const own = orientPower(Float64Array.of(40, 40, -1, -30, 5, 5, 0), "byTemperature", temperatures);
  expect([...own]).toEqual([40, -40, NaN, -30, NaN, NaN, 0]);
});
