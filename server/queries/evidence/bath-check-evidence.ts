import { bathCheck, type BathCheckResult } from "@shared/domain/uncertainty/bath-check";
import type { BathCheckEvidence } from "@shared/domain/uncertainty/point-evidence";
import type { BathCheck } from "@server/models/bath-check";
import { checkBefore } from "./pair-checks";

/**
 * What a stored check says, its drift against the standing check of the same pair before it.
 * @param checks every check of the pair, replaced ones too.
 */
export function bathCheckResult(check: BathCheck, checks: readonly BathCheck[]): BathCheckResult {
  const before = checkBefore(check, checks);
  const earlier = before && bathCheck(before.readings, before.bathUncertaintyK);
  // The earlier check may have named the same two probes the other way round.
  const sign = before?.firstProbeId === check.firstProbeId ? 1 : -1;
  const result = bathCheck(
    check.readings,
    check.bathUncertaintyK,
    earlier && { meanDifferenceK: sign * earlier.meanDifferenceK },
  );
  if (result === null) throw new Error(`bath check ${check.id} holds fewer than two pairs`);
  return result;
}

export function bathCheckEvidence(
  check: BathCheck,
  checks: readonly BathCheck[],
  serialOf: (probeId: string) => string,
): BathCheckEvidence {
  return {
    ...bathCheckResult(check, checks),
    checkedOn: check.checkedOn,
    firstSerial: serialOf(check.firstProbeId),
    secondSerial: serialOf(check.secondProbeId),
  };
}
