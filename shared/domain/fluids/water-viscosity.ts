import release from "../../data/viscosity_r12_08_coefficients.json";

/**
 * Dynamic viscosity of water in Pa·s from temperature and density: IAPWS R12-08, equations 10 to 12
 * with μ₂ = 1, the industrial form that leaves the critical enhancement out.
 *
 * Valid for liquid, vapour and gas up to 900 °C. Source: IAPWS R12-08, tables 1 and 2. No range
 * check, so that it can be held against table 4.
 * Example: 298.15 K and 998 kg/m³ → 889.7351e-6 Pa·s (table 4).
 */
export function waterViscosityPaS(temperatureC: number, densityKgPerM3: number): number {
  const t = (temperatureC + 273.15) / 647.096;
  const rho = densityKgPerM3 / 322;
  const inverse = 1 / t;
  let dilute = 0;
  for (const [i, h] of release.H_i.entries()) dilute += h * inverse ** i;
  let dense = 0;
  for (const { i, j, H } of release.H_ij) dense += H * (inverse - 1) ** i * (rho - 1) ** j;
  return ((100 * Math.sqrt(t)) / dilute) * Math.exp(rho * dense) * 1e-6;
}
