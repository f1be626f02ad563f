import if97 from "../../data/if97_region1_coefficients.json";
import type { FluidProblem } from "./fluid-problem";
import { saturationTemperatureC } from "./saturation";

/**
 * Liquid water: IAPWS-IF97 Region 1, equation 7, in full.
 *
 * Source: IAPWS R7-97(2012), tables 2 and 3. Used here from 0 to 150 °C and from 0.01 to 100 MPa,
 * never above the boiling point. Example: 300 K, 3 MPa → h 115.331273 kJ/kg (table 5).
 */
export interface WaterProperties {
  readonly densityKgPerM3: number;
  readonly enthalpyKjPerKg: number;
  readonly internalEnergyKjPerKg: number;
  readonly entropyKjPerKgK: number;
  /** Isobaric heat capacity. */
  readonly heatCapacityKjPerKgK: number;
  readonly soundSpeedMPerS: number;
}

export const LOWEST_WATER_C = 0;
export const HIGHEST_WATER_C = 150;
export const LOWEST_PRESSURE_MPA = 0.01;
export const HIGHEST_PRESSURE_MPA = 100;

const { R_kJ_per_kgK: R, p_star_MPa, T_star_K, pi_offset, tau_offset } = if97.constants;

/** The full sum at any state of Region 1; no range check, so that it can be held against table 5. */
export function waterRegion1(temperatureC: number, pressureMPa: number): WaterProperties {
  const kelvin = temperatureC + 273.15;
  const pi = pressureMPa / p_star_MPa;
  const tau = T_star_K / kelvin;
  const a = pi_offset - pi;
  const b = tau - tau_offset;
  let gamma = 0;
  let gammaPi = 0;
  let gammaPiPi = 0;
  let gammaTau = 0;
  let gammaTauTau = 0;
  let gammaPiTau = 0;
  for (const { I, J, n } of if97.terms) {
    const aI = a ** I;
    const bJ = b ** J;
    gamma += n * aI * bJ;
    gammaPi -= n * I * a ** (I - 1) * bJ;
    gammaPiPi += n * I * (I - 1) * a ** (I - 2) * bJ;
    gammaTau += n * aI * J * b ** (J - 1);
    gammaTauTau += n * aI * J * (J - 1) * b ** (J - 2);
    gammaPiTau -= n * I * a ** (I - 1) * J * b ** (J - 1);
  }
  const rt = R * kelvin;
  const mixed = gammaPi - tau * gammaPiTau;
  return {
    // R is in kJ, p in MPa: v = R T π γ_π / p comes out in 10⁻³ m³/kg.
    densityKgPerM3: (1000 * pressureMPa) / (rt * pi * gammaPi),
    enthalpyKjPerKg: rt * tau * gammaTau,
    internalEnergyKjPerKg: rt * (tau * gammaTau - pi * gammaPi),
    entropyKjPerKgK: R * (tau * gammaTau - gamma),
    heatCapacityKjPerKgK: -R * tau * tau * gammaTauTau,
    soundSpeedMPerS: Math.sqrt(
      (1000 * rt * gammaPi * gammaPi) / ((mixed * mixed) / (tau * tau * gammaTauTau) - gammaPiPi),
    ),
  };
}

/** Says why water at this state is not liquid within 0 to 150 °C; null where it is. */
export function waterProblem(temperatureC: number, pressureMPa: number): FluidProblem | null {
  if (!(pressureMPa >= LOWEST_PRESSURE_MPA && pressureMPa <= HIGHEST_PRESSURE_MPA)) {
    return {
      code: "pressureOutOfRange",
      place: "pressure",
      value: Number.isFinite(pressureMPa) ? pressureMPa : null,
      message: `Water is not computed at ${pressureMPa} MPa absolute.`,
      remedy: "Check the loop's gauge pressure; leave it blank to assume 1.6 MPa absolute.",
    };
  }
  if (Number.isNaN(temperatureC)) {
    return {
      code: "temperatureMissing",
      place: "temperature",
      value: null,
      message: "There is no temperature.",
      remedy: "Give a supply and a return temperature for this row.",
    };
  }
  if (temperatureC < LOWEST_WATER_C) {
    return {
      code: "belowFreezing",
      place: "temperature",
      value: temperatureC,
      message: `Water at ${temperatureC} °C is below its freezing point.`,
      remedy:
        "Check the column's unit and the probe; if the loop holds glycol, say so on the loop.",
    };
  }
  if (temperatureC > HIGHEST_WATER_C) {
    return {
      code: "aboveRange",
      place: "temperature",
      value: temperatureC,
      message: `${temperatureC} °C is above 150 °C, the highest water temperature computed.`,
      remedy: "Check the column's unit (°F read as °C?) and the probe.",
    };
  }
  if (temperatureC > saturationTemperatureC(Math.min(pressureMPa, 22))) {
    return {
      code: "boiling",
      place: "temperature",
      value: temperatureC,
      message: `Water at ${temperatureC} °C and ${pressureMPa} MPa absolute is steam.`,
      remedy: "Check the loop's gauge pressure and the probe.",
    };
  }
  return null;
}

/** {@link waterRegion1} where water is liquid, else the problem. */
export function water(
  temperatureC: number,
  pressureMPa: number,
):
  | { readonly ok: true; readonly properties: WaterProperties }
  | { readonly ok: false; readonly problem: FluidProblem } {
  const problem = waterProblem(temperatureC, pressureMPa);
  return problem
    ? { ok: false, problem }
    : { ok: true, properties: waterRegion1(temperatureC, pressureMPa) };
}
