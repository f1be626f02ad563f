import if97 from "../../data/if97_region1_coefficients.json";

/**
 * Saturation line of water: IAPWS-IF97 Region 4, equation 30 and its exact inverse, equation 31.
 *
 * Source: IAPWS R7-97(2012), table 34. Range 273.15 to 647.096 K, 611.213 Pa to 22.064 MPa.
 * Example: 500 K → 2.63889776 MPa (table 35).
 */
const [n1, n2, n3, n4, n5, n6, n7, n8, n9, n10] = if97.region4_saturation.n as [
  number,
  number,
  number,
  number,
  number,
  number,
  number,
  number,
  number,
  number,
];

/** Pressure at which water boils at `temperatureC`, MPa absolute. NaN outside 0 to 373.946 °C. */
export function saturationPressureMPa(temperatureC: number): number {
  const kelvin = temperatureC + 273.15;
  if (!(kelvin >= 273.15 && kelvin <= 647.096)) return NaN;
  const theta = kelvin + n9 / (kelvin - n10);
  const a = theta * theta + n1 * theta + n2;
  const b = n3 * theta * theta + n4 * theta + n5;
  const c = n6 * theta * theta + n7 * theta + n8;
  return ((2 * c) / (-b + Math.sqrt(b * b - 4 * a * c))) ** 4;
}

/** Temperature at which water boils at `pressureMPa` absolute, °C. NaN outside the range. */
export function saturationTemperatureC(pressureMPa: number): number {
  if (!(pressureMPa >= 0.000611212677 && pressureMPa <= 22.064)) return NaN;
  const beta = pressureMPa ** 0.25;
  const e = beta * beta + n3 * beta + n6;
  const f = n1 * beta * beta + n4 * beta + n7;
  const g = n2 * beta * beta + n5 * beta + n8;
  const d = (2 * g) / (-f - Math.sqrt(f * f - 4 * e * g));
  const sum = n10 + d;
  return (sum - Math.sqrt(sum * sum - 4 * (n9 + n10 * d))) / 2 - 273.15;
}
