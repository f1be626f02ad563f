/** An input of a function: its value and standard uncertainty. */
export interface Input {
  readonly value: number;
  readonly standard: number;
}

export interface Output {
  readonly value: number;
  readonly standard: number;
}

/**
 * Standard uncertainty of a function of correlated inputs: u² = Σᵢ Σⱼ cᵢ cⱼ r(xᵢ, xⱼ) u(xᵢ) u(xⱼ),
 * JCGM 100 (GUM), 5.2.2, with cᵢ from central differences over ±u(xᵢ)/100.
 *
 * `correlations[i][j]` is r, symmetric with 1 on the diagonal; null means independent. First order:
 * for inputs whose curvature matters within ±u, draw at random instead. A slip of rounding below 0
 * counts as 0. Example: GUM H.2, R = V/I·cos φ → 127.732 Ω, u = 0.06998 Ω.
 */
export function uncertaintyOfFunction(
  f: (values: readonly number[]) => number,
  inputs: readonly Input[],
  correlations: readonly (readonly number[])[] | null = null,
): Output {
  const values = inputs.map((input) => input.value);
  const contributions = inputs.map(({ value, standard }, i) => {
    if (standard === 0) return 0;
    const step = standard / 100;
    const shifted = (by: number) => f(values.map((each, j) => (i === j ? value + by : each)));
    const above = shifted(step);
    const below = shifted(-step);
    return ((above - below) / (2 * step)) * standard;
  });
  let variance = 0;
  for (const [i, a] of contributions.entries()) {
    for (const [j, b] of contributions.entries()) {
      const r = i === j ? 1 : (correlations?.[i]?.[j] ?? 0);
      variance += r * a * b;
    }
  }
  return { value: f(values), standard: Math.sqrt(Math.max(0, variance)) };
}
