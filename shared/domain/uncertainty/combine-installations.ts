import type { CombinedTerm, CombinedUncertainty } from "./budget";
import { COVERAGE_FACTOR } from "./combine-terms";
import type { BudgetTermKind } from "./point-evidence";

/** The part of a range one installation speaks for. */
export interface InstallationPart {
  /** Energy or volume of the part; parts add up to the range's figure. */
  readonly value: number;
  readonly combined: CombinedUncertainty;
  /**
   * What each systematic term comes from, such as a meter's or a pair's serial numbers or the pipe.
   * A kind left out may come from the same thing as another part's.
   */
  readonly sources?: Partial<Readonly<Record<BudgetTermKind, string>>>;
}

export interface RangeUncertainty extends CombinedUncertainty {
  /** Kinds that were added up straight because the parts share them or may do so. */
  readonly sharedKinds: readonly BudgetTermKind[];
  /** Kinds that come from different things in every part, so that their errors are independent. */
  readonly separateKinds: readonly BudgetTermKind[];
}

/**
 * Uncertainty of a figure summed over several installations.
 *
 * A systematic error of one kind is taken to be one and the same error in every part and is added up
 * straight, which is the cautious side: a meter, a pair or a pipe may have stayed. Where the sources
 * of a kind are known and differ, parts from different sources are combined as root of the sum of
 * squares instead. Different kinds are independent, and so are the random terms of different parts
 * (JCGM 100, 5.1.2 and 5.2.2 with r = 1 or 0). A term that did not shrink for want of movement counts
 * with the random ones here; it is combined like them.
 *
 * Null without parts, and where the figure is 0. Example: 100 and 300 kWh, each 2 % systematic and 1 %
 * random, from one meter → 8 kWh systematic, 3.162 kWh random; from two → 6.325 and 3.162 kWh.
 */
export function combineInstallations(parts: readonly InstallationPart[]): RangeUncertainty | null {
  const value = parts.reduce((sum, part) => sum + part.value, 0);
  if (parts.length === 0 || value === 0) return null;
  const kinds = new Set(parts.flatMap((part) => part.combined.terms.map((put) => put.term.kind)));
  const toPercent = 100 / Math.abs(value);
  const terms: CombinedTerm[] = [];
  const sharedKinds: BudgetTermKind[] = [];
  const separateKinds: BudgetTermKind[] = [];
  let systematic = 0;
  let random = 0;
  for (const kind of kinds) {
    const ofKind = parts.flatMap((part) => {
      const put = part.combined.terms.find((each) => each.term.kind === kind);
      return put ? [{ put, source: part.sources?.[kind] ?? null }] : [];
    });
    const largest = ofKind.reduce((a, b) => (b.put.absolute > a.put.absolute ? b : a));
    const isRandom = largest.put.term.nature === "random";
    const absolute = isRandom
      ? Math.hypot(...ofKind.map((each) => each.put.absolute))
      : sumBySource(ofKind.map((each) => ({ size: each.put.absolute, source: each.source })));
    if (isRandom) random = Math.hypot(random, absolute);
    else {
      systematic = Math.hypot(systematic, absolute);
      const sources = new Set(ofKind.map((each) => each.source));
      const separate = !sources.has(null) && sources.size === ofKind.length && ofKind.length > 1;
      (separate ? separateKinds : sharedKinds).push(kind);
    }
    terms.push({ term: largest.put.term, percent: absolute * toPercent, absolute });
  }
  const combined = Math.hypot(systematic, random);
  return {
    terms: terms.sort((a, b) => b.absolute - a.absolute),
    systematicPercent: systematic * toPercent,
    randomPercent: random * toPercent,
    combinedPercent: combined * toPercent,
    k: COVERAGE_FACTOR,
    expandedPercent: COVERAGE_FACTOR * combined * toPercent,
    expanded: COVERAGE_FACTOR * combined,
    samples: parts.reduce((sum, part) => sum + part.combined.samples, 0),
    effectiveSamples: parts.reduce((sum, part) => sum + part.combined.effectiveSamples, 0),
    sharedKinds,
    separateKinds,
  };
}

/** Straight within one source, as squares across known sources; one unknown source makes all one. */
function sumBySource(
  parts: readonly { readonly size: number; readonly source: string | null }[],
): number {
  if (parts.some((part) => part.source === null)) {
    return parts.reduce((sum, part) => sum + part.size, 0);
  }
  const bySource = new Map<string | null, number>();
  for (const { size, source } of parts) bySource.set(source, (bySource.get(source) ?? 0) + size);
  return Math.hypot(...bySource.values());
}
