import type { Finding, FindingWeight } from "./finding";

/**
 * Findings in the order in which somebody should settle them: by weight, then by the energy at stake,
 * largest first; unknown energy comes after known, then the earlier. Findings that are equal in all
 * keep the order they were given in. `kwhAtStake` may be negative; its size counts.
 */
export function rankFindings<Found extends Finding>(
  findings: readonly Found[],
  kwhAtStake: (finding: Found) => number | null,
): Found[] {
  const stakes = new Map(
    findings.map((finding) => {
      const kwh = kwhAtStake(finding);
      return [finding, kwh === null || Number.isNaN(kwh) ? -1 : Math.abs(kwh)] as const;
    }),
  );
  const starts = (finding: Found) => finding.spans[0]?.startMs ?? Infinity;
  return [...findings].sort(
    (a, b) =>
      ORDER[a.weight] - ORDER[b.weight] ||
      compare(stakes.get(b)!, stakes.get(a)!) ||
      compare(starts(a), starts(b)),
  );
}

const ORDER: Readonly<Record<FindingWeight, number>> = { stop: 0, look: 1, note: 2 };

/** Without a difference, which two infinities do not have. */
const compare = (a: number, b: number) => (a < b ? -1 : a > b ? 1 : 0);
