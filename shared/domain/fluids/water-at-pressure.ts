import if97 from "../../data/if97_region1_coefficients.json";
import type { FluidAtPressure } from "./fluid-at-pressure";
import { saturationTemperatureC } from "./saturation";
import {
  HIGHEST_PRESSURE_MPA,
  HIGHEST_WATER_C,
  LOWEST_PRESSURE_MPA,
  LOWEST_WATER_C,
  waterRegion1,
} from "./water";
import { waterViscosityPaS } from "./water-viscosity";

/** Powers of b that occur in Region 1, in the order in which {@link powerSum} reads them. */
const POWERS = [
  0, 1, 2, 3, 4, 5, 6, 10, 17, -1, -2, -3, -4, -5, -6, -7, -8, -9, -11, -29, -31, -38, -39, -40,
  -41,
];
const POSITION = new Map(POWERS.map((power, position) => [power, position]));

/**
 * Σ c·b^J over {@link POWERS}; `y` is 1/b. Neighbouring powers are paired before they are raised
 * further, so that the processor works on several at once; that is twice as quick as one long chain.
 */
function powerSum(c: Float64Array, b: number, y: number): number {
  const b2 = b * b;
  const b4 = b2 * b2;
  const y2 = y * y;
  const y4 = y2 * y2;
  const y8 = y4 * y4;
  const y3 = y2 * y;
  const up = c[6]! * b2 + (c[7]! + c[8]! * b4 * b2 * b) * b4 * b2;
  const positive = c[0]! + c[1]! * b + (c[2]! + c[3]! * b) * b2 + (c[4]! + c[5]! * b + up) * b4;
  const near = c[9]! * y + c[10]! * y2 + (c[11]! * y + c[12]! * y2) * y2;
  const middle = c[13]! * y + c[14]! * y2 + (c[15]! * y + c[16]! * y2) * y2;
  const down = c[17]! * y + c[18]! * y3;
  const far = c[21]! + c[22]! * y + (c[23]! + c[24]! * y) * y2;
  const farther = c[19]! + c[20]! * y2 + far * y8 * y;
  return positive + near + (middle + (down + farther * y8 * y8 * y4 * y) * y4) * y4;
}

/**
 * Water at one fixed pressure, fast enough for a year of minutes in a blink.
 *
 * A loop has one pressure, so (7.1 − π)^I of every IF97 term is a constant: the 34 terms fold into
 * one coefficient for each power of b = τ − 1.222, and the sum is Horner's rule in b and 1/b. That
 * is the whole equation, not a fit: density and enthalpy agree with the full sum to rounding. Heat
 * capacity and viscosity are asked once a period, not once a row, and use the full sum.
 *
 * `pressureMPa` is absolute, 0.01 to 100; anything else is a RangeError, because a loop's pressure is
 * checked before it is stored.
 * Example: at 1.6 MPa `density(12)` is 1000.20678 kg/m³ and `enthalpy(12)` 51.9560697 kJ/kg.
 */
export function waterAtPressure(pressureMPa: number): FluidAtPressure {
  if (!(pressureMPa >= LOWEST_PRESSURE_MPA && pressureMPa <= HIGHEST_PRESSURE_MPA)) {
    throw new RangeError(
      `Water is computed from ${LOWEST_PRESSURE_MPA} to ${HIGHEST_PRESSURE_MPA} MPa absolute, not at ${pressureMPa}. Check the loop's pressure.`,
    );
  }
  const { R_kJ_per_kgK: R, p_star_MPa, T_star_K, pi_offset, tau_offset } = if97.constants;
  const a = pi_offset - pressureMPa / p_star_MPa;
  const gammaPi = new Float64Array(POWERS.length);
  // γ_τ·b: the factor J joins the coefficient and the power stays that of γ.
  const gammaTauB = new Float64Array(POWERS.length);
  for (const { I, J, n } of if97.terms) {
    const position = POSITION.get(J);
    if (position === undefined) throw new RangeError(`IF97 term with unknown power ${J}.`);
    gammaPi[position]! -= n * I * a ** (I - 1);
    gammaTauB[position]! += n * J * a ** I;
  }
  const rTStar = R * T_star_K;
  const densityFactor = (1000 * p_star_MPa) / R;
  const density = (temperatureC: number) => {
    const kelvin = temperatureC + 273.15;
    const b = T_star_K / kelvin - tau_offset;
    return densityFactor / (kelvin * powerSum(gammaPi, b, 1 / b));
  };
  return {
    kind: "water",
    pressureMPa,
    lowestC: LOWEST_WATER_C,
    highestC:
      pressureMPa >= 1
        ? HIGHEST_WATER_C
        : Math.min(HIGHEST_WATER_C, saturationTemperatureC(pressureMPa)),
    density,
    enthalpy(temperatureC) {
      const b = T_star_K / (temperatureC + 273.15) - tau_offset;
      const y = 1 / b;
      return rTStar * y * powerSum(gammaTauB, b, y);
    },
    heatCapacity: (temperatureC) => waterRegion1(temperatureC, pressureMPa).heatCapacityKjPerKgK,
    viscosityPaS: (temperatureC) => waterViscosityPaS(temperatureC, density(temperatureC)),
  };
}
