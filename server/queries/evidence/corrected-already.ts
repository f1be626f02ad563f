import type { InstallationFields } from "@shared/contracts/evidence";
import type { StandingCorrection } from "@server/readings/point-corrections";

type Fields = Pick<InstallationFields, "startsAt" | "probes">;

/** What applied corrections have put right in the readings of an installation, from its start on. */
export function putRightBy(
  corrections: readonly StandingCorrection[],
  { startsAt, probes }: Fields,
): { readonly enteredBore: boolean; readonly pairDifference: boolean } {
  const start = Date.parse(startsAt);
  const pair = probes ? [probes.supply.probeId, probes.return.probeId] : [];
  const changes = corrections.map(({ change }) => change);
  const reaches = (from: string, to: string | null) =>
    to === null || (Date.parse(to) > start && Date.parse(from) < Date.parse(to));
  return {
    enteredBore: changes.some(
      (change) => change.kind === "scaleByBore" && reaches(change.from, change.to),
    ),
    pairDifference: changes.some(
      (change) =>
        change.kind === "probeOffset" &&
        pair.includes(change.probeId) &&
        reaches(change.from, change.to),
    ),
  };
}
