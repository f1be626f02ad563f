import type { BathCheck as BathCheckAnswer } from "@shared/contracts/evidence";
import { bathCheckVerdicts } from "@shared/domain/uncertainty/bath-check";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { BathCheck } from "@server/models/bath-check";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import { bathCheckResult } from "@server/queries/evidence/bath-check-evidence";

/**
 * @param checks every check of the same probes, replaced ones too: the drift hangs on them.
 * @param serialOf the serial of a probe by its id.
 */
export function presentBathCheck(
  row: BathCheck,
  checks: readonly BathCheck[],
  serialOf: (probeId: string) => string,
  actor: Actor,
): BathCheckAnswer {
  const result = bathCheckResult(row, checks);
  const { checkedOn } = row;
  return {
    id: row.id,
    firstProbeId: row.firstProbeId,
    secondProbeId: row.secondProbeId,
    firstSerial: serialOf(row.firstProbeId),
    secondSerial: serialOf(row.secondProbeId),
    checkedOn,
    bathUncertaintyK: row.bathUncertaintyK,
    readings: [...row.readings],
    bathC: result.bathC,
    pairs: result.pairs,
    meanDifferenceK: result.meanDifferenceK,
    deviationK: result.deviationK,
    residualK: result.residualK,
    driftK: result.driftK,
    verdicts: bathCheckVerdicts({ ...result, checkedOn }, checkedOn),
    notes: row.notes,
    replacesId: row.supersedesId,
    supersededAt: instantTextOrNull(row.supersededAt),
    recordedAt: instantText(row.recordedAt),
    recordedBy: row.recordedByName,
    can: { edit: can(actor).editEvidence && row.supersededAt === null },
  };
}
