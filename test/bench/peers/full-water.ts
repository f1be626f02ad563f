import if97 from "@shared/data/if97_region1_coefficients.json";

/** Density and enthalpy by the sum as IAPWS R7-97 prints it: how one writes it down at first. */
export function fullWater(temperatureC: number, pressureMPa: number) {
  const { R_kJ_per_kgK: R, p_star_MPa, T_star_K, pi_offset, tau_offset } = if97.constants;
  const kelvin = temperatureC + 273.15;
  const a = pi_offset - pressureMPa / p_star_MPa;
  const b = T_star_K / kelvin - tau_offset;
  let gammaPi = 0;
  let gammaTau = 0;
  for (const { I, J, n } of if97.terms) {
    gammaPi -= n * I * Math.pow(a, I - 1) * Math.pow(b, J);
    gammaTau += n * Math.pow(a, I) * J * Math.pow(b, J - 1);
  }
  return {
    densityKgPerM3: (1000 * p_star_MPa) / (R * kelvin * gammaPi),
    enthalpyKjPerKg: R * T_star_K * gammaTau,
  };
}
