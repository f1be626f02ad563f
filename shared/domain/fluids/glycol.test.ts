import { ASHRAE_GLYCOL, type GlycolKind } from "./glycol-ashrae";
import { glycolAtPressure } from "./glycol-at-pressure";
import {
  glycolConcentration,
  massFromVolumePercent,
  volumeFromMassPercent,
} from "./glycol-concentration";
import { mixtureAt } from "./glycol-correlation";
import {
  correlationSpreadPercent,
  fluidHeatUncertaintyPercent,
  INTERPOLATION_HALF_WIDTH_PERCENT,
} from "./fluid-heat-uncertainty";
import { fluidFacts } from "./fluid-facts";
import { freezingPointC } from "./freezing-point";
import { temperatureProblem } from "./temperature-problem";
import { waterAtPressure } from "./water-at-pressure";

const KINDS: readonly GlycolKind[] = ["ethyleneGlycol", "propyleneGlycol"];

/** The correlation as published, term by term. */
function fullSum(rows: readonly (readonly number[])[], dT: number, dx: number): number {
  let sum = 0;
  rows.forEach((row, i) => row.forEach((c, j) => (sum += c * dT ** i * dx ** j)));
  return sum;
}

test("the folded correlation equals the sum of all terms to 1e-12, and enthalpy is its integral", () => {
  for (const kind of KINDS) {
    const { Tbase, xbase, density, specific_heat, ln_viscosity } = ASHRAE_GLYCOL[kind];
    for (const volumePercent of [10, 22.5, 35, 60]) {
      const fluid = glycolAtPressure(kind, volumePercent, 1.6);
      const dx = volumePercent / 100 - xbase;
      for (let t = Math.ceil(fluid.lowestC); t <= 100; t += 6.3) {
        const dT = t + 273.15 - Tbase;
        expect(Math.abs(fluid.density(t) / fullSum(density, dT, dx) - 1)).toBeLessThan(1e-12);
        expect(
          Math.abs(fluid.heatCapacity(t) / (fullSum(specific_heat, dT, dx) / 1000) - 1),
        ).toBeLessThan(1e-12);
        expect(
          Math.abs(fluid.viscosityPaS(t) / Math.exp(fullSum(ln_viscosity, dT, dx)) - 1),
        ).toBeLessThan(1e-12);
        // Simpson's rule is exact for a cubic.
        const simpson =
          (fluid.heatCapacity(t) + 4 * fluid.heatCapacity(t + 2) + fluid.heatCapacity(t + 4)) *
          (4 / 6);
        expect(Math.abs((fluid.enthalpy(t + 4) - fluid.enthalpy(t)) / simpson - 1)).toBeLessThan(
          1e-12,
        );
      }
    }
  }
});

test("mass and volume percent are each other's inverse, and 0 % is 0 %", () => {
  for (const kind of KINDS) {
    expect(volumeFromMassPercent(kind, 0)).toBe(0);
    for (const mass of [0.1, 2, 5, 9.99, 10.01, 30, 60]) {
      expect(massFromVolumePercent(kind, volumeFromMassPercent(kind, mass))).toBeCloseTo(mass, 9);
    }
  }
  expect(volumeFromMassPercent("ethyleneGlycol", 30)).toBeCloseTo(27.705, 3);
  expect(glycolConcentration("ethyleneGlycol", 27.705, "volume")?.massPercent).toBeCloseTo(30, 3);
  expect(glycolConcentration("ethyleneGlycol", 60.01, "volume")).toBeNull();
});

test("at 0 % it is water, and towards 0 % and 10 % it runs into both without a step", () => {
  const water = waterAtPressure(0.6);
  for (const kind of KINDS) {
    expect(glycolAtPressure(kind, 0, 0.6).enthalpy(12)).toBe(water.enthalpy(12));
    for (const [percent, neighbour] of [
      [1e-7, water],
      [10 - 1e-7, glycolAtPressure(kind, 10, 0.6)],
    ] as const) {
      const fluid = glycolAtPressure(kind, percent, 0.6);
      for (const t of [0, 6, 55, 100]) {
        expect(Math.abs(fluid.density(t) / neighbour.density(t) - 1)).toBeLessThan(1e-8);
        expect(Math.abs(fluid.heatCapacity(t) / neighbour.heatCapacity(t) - 1)).toBeLessThan(1e-8);
        expect(Math.abs(fluid.viscosityPaS(t) / neighbour.viscosityPaS(t) - 1)).toBeLessThan(1e-7);
      }
      const difference = (of: typeof fluid) => of.enthalpy(12) - of.enthalpy(6);
      expect(Math.abs(difference(fluid) / difference(neighbour) - 1)).toBeLessThan(1e-8);
    }
  }
});

test("a mixture is refused where it freezes, where tables end and where water would boil", () => {
  const thirty = glycolAtPressure("ethyleneGlycol", 30, 1.6);
  expect(thirty.lowestC).toBe(freezingPointC("ethyleneGlycol", 30));
  expect(temperatureProblem(thirty, thirty.lowestC)).toBeNull();
  expect(temperatureProblem(thirty, thirty.lowestC - 0.01)?.code).toBe("belowFreezing");
  expect(temperatureProblem(thirty, 100)).toBeNull();
  expect(temperatureProblem(thirty, 100.1)?.code).toBe("aboveRange");
  expect(temperatureProblem(thirty, NaN)?.code).toBe("temperatureMissing");
  // 60 % freezes at −48 °C and lower; the tables end before.
  const strong = glycolAtPressure("propyleneGlycol", 60, 1.6);
  expect(strong.lowestC).toBe(-35);
  expect(temperatureProblem(strong, -35.1)?.code).toBe("belowRange");
  const vacuum = glycolAtPressure("propyleneGlycol", 30, 0.05);
  expect(temperatureProblem(vacuum, 90)?.code).toBe("boiling");
  // Between water and 10 % properties need water's, which end at 0 °C.
  const dilute = glycolAtPressure("propyleneGlycol", 5, 1.6);
  expect(temperatureProblem(dilute, -0.5)?.code).toBe("belowRange");
  expect(temperatureProblem(waterAtPressure(1.6), -0.5)?.code).toBe("belowFreezing");
  expect(() => glycolAtPressure("ethyleneGlycol", 60.1, 1.6)).toThrow("60 %");
});

test("the spread of the correlations is a rectangle's half-width, and water has none", () => {
  const fluid = { kind: "ethyleneGlycol", percent: 30, basis: "mass" } as const;
  const spread = correlationSpreadPercent(fluid.kind, volumeFromMassPercent(fluid.kind, 30), 6, 12);
  // The ratios to water at 12/6 °C, −8.93 % and −8.49 %, stand (100 − 8.49)/(100 − 8.93) apart.
  expect(spread).toBeCloseTo(0.49, 1);
  const uncertainty = fluidHeatUncertaintyPercent(fluid, 6, 12);
  expect(uncertainty).toMatchObject({ interpolationPercent: 0, reasons: ["correlationSpread"] });
  expect(uncertainty?.kPercent).toBeCloseTo(spread / Math.sqrt(3), 12);
  expect(fluidHeatUncertaintyPercent(fluid, 60, 50)?.reasons).toContain("crossCheckExtrapolated");
  expect(fluidHeatUncertaintyPercent({ kind: "water" }, 6, 12)).toEqual({
    kPercent: 0,
    glycolSpreadPercent: 0,
    interpolationPercent: 0,
    reasons: [],
  });
  expect(fluidHeatUncertaintyPercent({ ...fluid, percent: 70 }, 6, 12)).toBeNull();
});

test("between 0 and 10 % the interpolation adds its term, nothing at either end", () => {
  const at = (percent: number) =>
    fluidHeatUncertaintyPercent({ kind: "propyleneGlycol", percent, basis: "volume" }, 6, 12);
  expect(at(5)?.interpolationPercent).toBeCloseTo(1.5 / Math.sqrt(3), 12);
  expect(at(5)?.reasons).toEqual(["correlationSpread", "interpolatedToWater"]);
  expect(at(5)?.kPercent).toBeCloseTo(
    Math.hypot(at(5)!.interpolationPercent, at(5)!.glycolSpreadPercent),
    12,
  );
  expect(at(10)?.interpolationPercent).toBe(0);
  expect(at(0)?.kPercent).toBe(0);
  expect(at(1e-6)?.kPercent).toBeLessThan(1e-6);
});

test("from 5 to 10 % the term's width covers the ASHRAE fits continued below their tables", () => {
  for (const kind of KINDS) {
    for (const pressureMPa of [0.3, 1.6]) {
      for (const volumePercent of [5, 6, 7, 8, 9, 9.9]) {
        const used = glycolAtPressure(kind, volumePercent, pressureMPa);
        const continued = mixtureAt(ASHRAE_GLYCOL[kind], volumePercent / 100);
        const share = volumePercent / 10;
        const halfWidth = INTERPOLATION_HALF_WIDTH_PERCENT * 4 * share * (1 - share);
        for (let t = 1; t <= 100; t += 9) {
          const ratio =
            (continued.density(t) * continued.heatCapacity(t)) /
            (used.density(t) * used.heatCapacity(t));
          expect(100 * Math.abs(ratio - 1)).toBeLessThan(halfWidth);
        }
      }
    }
  }
});

test("what a person should know of a mixture: both percentages, freezing point, interpolation", () => {
  const thirty = fluidFacts({ kind: "propyleneGlycol", percent: 30, basis: "mass" }, 0.3);
  expect(thirty).toMatchObject({ massPercent: 30, highestC: 100, interpolated: false });
  // ASHRAE tables: 29.4 % by volume, −12.7 °C.
  expect(thirty?.volumePercent).toBeCloseTo(29.4, 1);
  expect(thirty?.freezesAtC).toBeCloseTo(-12.7, 1);
  expect(thirty?.lowestC).toBe(thirty?.freezesAtC);
  const dilute = fluidFacts({ kind: "ethyleneGlycol", percent: 5, basis: "volume" }, null);
  expect(dilute).toMatchObject({ interpolated: true, lowestC: 0 });
  expect(dilute!.freezesAtC).toBeLessThan(-1);
  expect(fluidFacts({ kind: "water" }, null)).toMatchObject({ freezesAtC: 0, highestC: 150 });
  expect(fluidFacts({ kind: "ethyleneGlycol", percent: 70, basis: "volume" }, null)).toBeNull();
});
