import { ASHRAE_GLYCOL } from "@shared/domain/fluids/glycol-ashrae";
import { glycolAtPressure } from "@shared/domain/fluids/glycol-at-pressure";
import type { FluidAtPressure } from "@shared/domain/fluids/fluid-at-pressure";
import { waterRegion1 } from "@shared/domain/fluids/water";
import { waterAtPressure } from "@shared/domain/fluids/water-at-pressure";
import { interleaved, seconds } from "./measure";
import { times, type Line } from "./report";

const PRESSURE_MPA = 0.6;
const VOLUME_PERCENT = 30;
const PROMISED_PER_SECOND = 2_000_000;
const COUNT = 400_000;

/** Temperatures of a loop, none twice, so that no result can be reused. */
const temperaturesC = Float64Array.from({ length: COUNT }, (_, i) => 5 + (i * 85) / COUNT);

type Pair = (temperatureC: number) => number;

const folded =
  (fluid: FluidAtPressure): Pair =>
  (t) =>
    fluid.density(t) * fluid.enthalpy(t);

const fullWater: Pair = (t) => {
  const { densityKgPerM3, enthalpyKjPerKg } = waterRegion1(t, PRESSURE_MPA);
  return densityKgPerM3 * enthalpyKjPerKg;
};

/** The correlation as it is printed, term by term. */
const fullGlycol: Pair = (t) => {
  const { Tbase, xbase, density, specific_heat } = ASHRAE_GLYCOL.propyleneGlycol;
  const dT = t + 273.15 - Tbase;
  const at0 = 273.15 - Tbase;
  const dx = VOLUME_PERCENT / 100 - xbase;
  let rho = 0;
  density.forEach((row, i) => row.forEach((c, j) => (rho += c * dT ** i * dx ** j)));
  let heat = 0;
  specific_heat.forEach((row, i) =>
    row.forEach((c, j) => {
      heat += (c * dx ** j * (dT ** (i + 1) - at0 ** (i + 1))) / (i + 1);
    }),
  );
  return (rho * heat) / 1000;
};

/** Density and enthalpy of the fluids energy is formed with, against the full published sums. */
export async function benchFluids(rounds: number): Promise<Line[]> {
  const run = (pair: Pair) => () =>
    seconds(() => {
      let sum = 0;
      for (let i = 0; i < COUNT; i++) sum += pair(temperaturesC[i]!);
      if (!Number.isFinite(sum)) throw new Error("A property is not a number.");
    });
  const took = await interleaved(rounds, {
    water: run(folded(waterAtPressure(PRESSURE_MPA))),
    "water in full": run(fullWater),
    glycol: run(folded(glycolAtPressure("propyleneGlycol", VOLUME_PERCENT, PRESSURE_MPA))),
    "glycol in full": run(fullGlycol),
    "5 % glycol": run(folded(glycolAtPressure("propyleneGlycol", 5, PRESSURE_MPA))),
  });
  const line = (name: keyof typeof took, full: number | null): Line => {
    const perSecond = COUNT / took[name];
    return {
      goal: `density and enthalpy, ${name}`,
      promise: "2 million/s on one core",
      ours: `${(perSecond / 1e6).toFixed(1)} million/s`,
      peer: full === null ? "–" : `${(COUNT / full / 1e6).toFixed(2)} million/s, full sum`,
      ratio: full === null ? "–" : times(full / took[name]),
      met: perSecond >= PROMISED_PER_SECOND,
    };
  };
  return [
    line("water", took["water in full"]),
    line("glycol", took["glycol in full"]),
    line("5 % glycol", null),
  ];
}
