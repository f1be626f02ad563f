import type { StandInInput, StandInResult } from "@shared/contracts/meter-comparisons";
import { standIn } from "@shared/domain/uncertainty/stand-in";
import { standInUncertainty } from "@shared/domain/uncertainty/stand-in-uncertainty";
import { Invalid } from "@server/http/errors";

/** @throws Invalid (422) where nothing was covered to scale from, or more than the outage. */
export function workOutStandIn(asked: StandInInput): StandInResult {
  const found = standIn({
    hours: asked.outageHours,
    coveredHours: asked.coveredHours,
    coveredKwh: asked.coveredKwh,
    degreeHours: asked.degreeHours,
  });
  if (found === null) throw refusal(asked);
  const { partsKwh, totalKwh } = standInUncertainty(found, asked);
  return {
    parts: found.parts.map((part, at) => ({ ...part, expandedKwh: partsKwh[at] ?? null })),
    totalKwh: found.totalKwh,
    expandedKwh: totalKwh,
    estimatedPercent: found.estimatedPercent,
  };
}

function refusal({ outageHours, coveredHours, degreeHours }: StandInInput): Invalid {
  if (coveredHours > outageHours)
    return Invalid.field(
      "standIn/coveredHours",
      "covered-beyond-outage",
      "The portable covers no more than the outage.",
    );
  const field = degreeHours === null ? "coveredHours" : "degreeHours/covered";
  return Invalid.field(
    `standIn/${field}`,
    "nothing-to-scale-from",
    "Without any covered time there is nothing to estimate the rest from.",
  );
}
