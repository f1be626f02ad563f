import type { BathCheck } from "@server/models/bath-check";

/** A check's place among the checks of its pair. */
const isLater = (one: BathCheck, other: BathCheck) =>
  one.checkedOn === other.checkedOn
    ? BigInt(one.id) > BigInt(other.id)
    : one.checkedOn > other.checkedOn;

const pairOf = ({ firstProbeId, secondProbeId }: BathCheck) =>
  [firstProbeId, secondProbeId].sort().join();

/** The check that stands in the place of this one, after however many corrections. */
export function standingCheck(check: BathCheck, checks: readonly BathCheck[]): BathCheck {
  let at = check;
  for (;;) {
    const next = checks.find(({ supersedesId }) => supersedesId === at.id);
    if (next === undefined) return at;
    at = next;
  }
}

/** The standing check of the same two probes before this one; null with none. */
export function checkBefore(check: BathCheck, checks: readonly BathCheck[]): BathCheck | null {
  return newest(
    checks.filter(
      (other) =>
        other.supersededAt === null &&
        other.id !== check.id &&
        other.id !== check.supersedesId &&
        pairOf(other) === pairOf(check) &&
        isLater(check, other),
    ),
  );
}

/** The newest standing check of two probes on or before a day; null with none. */
export function newestCheckOfPair(
  probeIds: readonly [string, string],
  day: string,
  checks: readonly BathCheck[],
): BathCheck | null {
  const pair = [...probeIds].sort().join();
  return newest(
    checks.filter(
      (check) => check.supersededAt === null && check.checkedOn <= day && pairOf(check) === pair,
    ),
  );
}

function newest(checks: readonly BathCheck[]): BathCheck | null {
  let best: BathCheck | null = null;
  for (const check of checks) if (best === null || isLater(check, best)) best = check;
  return best;
}
