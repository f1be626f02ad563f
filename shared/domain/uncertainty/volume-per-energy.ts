import type { CombinedTerm, CombinedUncertainty } from "./budget";
import { COVERAGE_FACTOR } from "./combine-terms";

/**
 * Expanded uncertainty of a volume over the energy it carried, % (k = 2).
 *
 * V/E = 1/(k·Δθ): whatever scales the flow scales both and cancels (JCGM 100, 5.2.2 with r = 1). A
 * zero's share of either goes with a mean speed of its own, so the difference of the two remains.
 * Noise and steps of the flow are kept whole, which is the cautious side, as are all terms of Δθ and
 * of heat.
 *
 * Example: energy with certificate 0.5, zero 0.6, pair 0.4 and density 0.03 %, volume with zero
 * 0.7 %: 2·√(0.1² + 0.4² + 0.03²) = 0.8268 %.
 *
 * @param energy, volume combined over the same readings.
 */
export function volumePerEnergyPercent(
  energy: CombinedUncertainty,
  volume: CombinedUncertainty,
): number {
  const zero = zeroOf(energy.terms) - zeroOf(volume.terms);
  const kept = energy.terms.filter(
    ({ term }) => term.actsOn !== "flow" || term.nature === "random",
  );
  return COVERAGE_FACTOR * Math.hypot(zero, ...kept.map(({ percent }) => percent));
}

function zeroOf(terms: readonly CombinedTerm[]): number {
  return terms.find(({ term }) => term.kind === "zero")?.percent ?? 0;
}
