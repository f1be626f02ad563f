import { absolutePressureMPa, fluidForEnergy } from "./loop-fluid";
import { saturationPressureMPa, saturationTemperatureC } from "./saturation";
import { water, waterProblem, waterRegion1 } from "./water";
import { waterAtPressure } from "./water-at-pressure";

test("the folded equation gives the power of the full sum to 1e-9 at half a kelvin", () => {
  for (const pressureMPa of [0.3, 0.6, 1.6, 2.6]) {
    const folded = waterAtPressure(pressureMPa);
    for (let returnC = 0; returnC < 132; returnC += 1.7) {
      const fast =
        folded.density(returnC) * (folded.enthalpy(returnC + 0.5) - folded.enthalpy(returnC));
      const at = waterRegion1(returnC, pressureMPa);
      const above = waterRegion1(returnC + 0.5, pressureMPa);
      const full = at.densityKgPerM3 * (above.enthalpyKjPerKg - at.enthalpyKjPerKg);
      expect(Math.abs(fast / full - 1)).toBeLessThan(1e-9);
    }
  }
});

test("the boiling temperature is the inverse of the boiling pressure", () => {
  for (const temperatureC of [5, 60, 99.97, 150, 300]) {
    expect(saturationTemperatureC(saturationPressureMPa(temperatureC))).toBeCloseTo(
      temperatureC,
      6,
    );
  }
});

test("water is refused below freezing, above 150 °C, where it boils and without a temperature", () => {
  expect(waterProblem(-0.01, 1.6)?.code).toBe("belowFreezing");
  expect(waterProblem(0, 1.6)).toBeNull();
  expect(waterProblem(150, 1.6)).toBeNull();
  expect(waterProblem(150.1, 1.6)?.code).toBe("aboveRange");
  expect(waterProblem(101, 0.101325)?.code).toBe("boiling");
  expect(waterProblem(99, 0.101325)).toBeNull();
  expect(waterProblem(NaN, 1.6)?.code).toBe("temperatureMissing");
  expect(waterProblem(20, 0)).toMatchObject({ code: "pressureOutOfRange", place: "pressure" });
  expect(water(-5, 1.6)).toMatchObject({ ok: false, problem: { value: -5, place: "temperature" } });
  expect(waterAtPressure(0.101325).highestC).toBeCloseTo(99.974, 3);
});

test("a gauge reading gains one standard atmosphere and a blank one is an assumption", () => {
  expect(absolutePressureMPa(0.3)).toEqual({ pressureMPa: 0.401325, assumed: false });
  expect(absolutePressureMPa(null)).toEqual({ pressureMPa: 1.6, assumed: true });
});

test("a glycol loop gets its mixture's properties and never water's", () => {
  const glycol = fluidForEnergy({ kind: "propyleneGlycol", percent: 30, basis: "mass" }, 0.2);
  expect(glycol).toMatchObject({
    ok: true,
    fluid: { kind: "propyleneGlycol", highestC: 100 },
    pressure: { pressureMPa: 0.301325, assumed: false },
  });
  expect(fluidForEnergy({ kind: "water" }, null)).toMatchObject({ ok: true });
  expect(fluidForEnergy({ kind: "water" }, -0.2)).toMatchObject({
    ok: false,
    problem: { code: "pressureOutOfRange" },
  });
});

test("a percentage outside the tables is refused, and an unknown one is not zero", () => {
  const problemOf = (percent: number, basis: "mass" | "volume") => {
    const result = fluidForEnergy({ kind: "ethyleneGlycol", percent, basis }, null);
    return result.ok ? null : result.problem;
  };
  expect(problemOf(60, "volume")).toBeNull();
  expect(problemOf(60, "mass")).toBeNull();
  expect(problemOf(60.1, "volume")).toMatchObject({
    code: "concentrationOutOfRange",
    place: "concentration",
    value: 60.1,
  });
  // 64 % by mass is 61.9 % by volume.
  expect(problemOf(64, "mass")).toMatchObject({ value: 64 });
  expect(problemOf(-1, "mass")).toMatchObject({ value: -1 });
  expect(problemOf(NaN, "mass")).toMatchObject({ code: "concentrationOutOfRange", value: null });
});
