/**
 * A mixture of glycol and water by polynomials in temperature and concentration,
 * f = Σ C[i][j]·(T − Tbase)^i·(x − xbase)^j, and what is left of them at one concentration.
 */
export interface GlycolCorrelation {
  /** K. */
  readonly Tbase: number;
  /** Fraction, of the volume or of the mass as the correlation has it. */
  readonly xbase: number;
  /** kg/m³. */
  readonly density: readonly (readonly number[])[];
  /** J/(kg·K). */
  readonly specific_heat: readonly (readonly number[])[];
  /** Natural logarithm of Pa·s. */
  readonly ln_viscosity: readonly (readonly number[])[];
}

export interface Mixture {
  /** kg/m³. */
  density(temperatureC: number): number;
  /** kJ/kg, 0 at 0 °C. */
  enthalpy(temperatureC: number): number;
  /** kJ/(kg·K). */
  heatCapacity(temperatureC: number): number;
  /** Pa·s. */
  viscosityPaS(temperatureC: number): number;
}

/** Σ c[j]·x^j. */
export function polynomial(coefficients: ArrayLike<number>, x: number): number {
  let sum = 0;
  for (let j = coefficients.length - 1; j >= 0; j--) sum = sum * x + coefficients[j]!;
  return sum;
}

/**
 * Folds a correlation at the concentration `fraction`: each property becomes a cubic in temperature,
 * which is the whole correlation and not a fit. Enthalpy is the exact integral of the heat capacity;
 * neither has a pressure term. No range check.
 */
export function mixtureAt(correlation: GlycolCorrelation, fraction: number): Mixture {
  const dx = fraction - correlation.xbase;
  const fold = (rows: readonly (readonly number[])[]) => rows.map((row) => polynomial(row, dx));
  const toBase = 273.15 - correlation.Tbase;
  const [r0 = 0, r1 = 0, r2 = 0, r3 = 0] = fold(correlation.density);
  const [c0 = 0, c1 = 0, c2 = 0, c3 = 0] = fold(correlation.specific_heat).map((c) => c / 1000);
  const lnViscosity = fold(correlation.ln_viscosity);
  const integral = (d: number) => d * (c0 + d * (c1 / 2 + d * (c2 / 3 + (d * c3) / 4)));
  const atZeroC = integral(toBase);
  return {
    density(temperatureC) {
      const d = temperatureC + toBase;
      return r0 + d * (r1 + d * (r2 + d * r3));
    },
    enthalpy: (temperatureC) => integral(temperatureC + toBase) - atZeroC,
    heatCapacity(temperatureC) {
      const d = temperatureC + toBase;
      return c0 + d * (c1 + d * (c2 + d * c3));
    },
    viscosityPaS: (temperatureC) => Math.exp(polynomial(lnViscosity, temperatureC + toBase)),
  };
}
