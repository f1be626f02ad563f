import { velocityMPerS } from "@shared/domain/pipes/bore";
import type { Workings } from "@shared/contracts/workings";
import { quotient, type FigureUncertainty } from "./figure-uncertainty";

/** The budget of a figure as its workings show it, largest term first. */
export function presentBudget({ combined, parts }: FigureUncertainty): Workings["budget"] {
  const sum = (of: (part: FigureUncertainty["parts"][number]) => number) =>
    parts.reduce((total, part) => total + of(part), 0);
  const volume = sum(({ sums }) => sums.volumeM3);
  const flowDeltaT = sum(({ sums }) => sums.flowDeltaTM3K);
  const deltaTKs = sum(({ sums }) => sums.deltaTKs);
  // One bore and one autocorrelation are named where all parts share them.
  const bores = new Set(parts.map(({ budget }) => budget.boreMm));
  const boreMm = bores.size === 1 ? ([...bores][0] ?? null) : null;
  const weightedFlow = quotient(flowDeltaT, deltaTKs / 3600);
  return {
    terms: combined.terms.map(({ term, percent, absolute }) => ({
      term: { ...term, origin: { ...term.origin, values: { ...term.origin.values } } },
      percent,
      absolute,
    })),
    systematicPercent: combined.systematicPercent,
    randomPercent: combined.randomPercent,
    combinedPercent: combined.combinedPercent,
    k: combined.k,
    expandedPercent: combined.expandedPercent,
    expanded: combined.expanded,
    samples: combined.samples,
    effectiveSamples: combined.effectiveSamples,
    autocorrelation: parts[0]?.budget.autocorrelation ?? 0,
    flowWeightedDeltaTK: quotient(flowDeltaT, volume),
    deltaTWeightedVelocityMPerS:
      weightedFlow === null || boreMm === null ? null : velocityMPerS(weightedFlow, boreMm),
    boreMm,
  };
}
