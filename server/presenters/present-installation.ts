import type {
  Installation as InstallationAnswer,
  WorkedOutInstallation,
} from "@shared/contracts/evidence";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { Installation } from "@server/models/installation";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import { fieldsOf } from "@server/queries/evidence/installation-fields";

export function presentInstallation(
  row: Installation,
  workedOut: WorkedOutInstallation,
  actor: Actor,
): InstallationAnswer {
  return {
    ...fieldsOf(row),
    ...workedOut,
    id: row.id,
    pointId: row.pointId,
    version: row.version,
    supersededAt: instantTextOrNull(row.supersededAt),
    supersedesId: row.supersedesId,
    withdrawnAt: instantTextOrNull(row.withdrawnAt),
    withdrawnBy: row.withdrawnByName,
    withdrawnReason: row.withdrawnReason,
    recordedAt: instantText(row.recordedAt),
    recordedBy: row.recordedByName,
    reason: row.reason,
    can: { edit: can(actor).editEvidence && row.stands },
  };
}
