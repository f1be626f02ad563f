import type { z } from "zod";
import type { fill as answer } from "@shared/contracts/corrections";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { EnergyFill } from "@server/models/energy-fill";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";

export function presentFill(row: EnergyFill, actor: Actor): z.input<typeof answer> {
  const { correctReadings, approveFills } = can(actor);
  return {
    id: row.id,
    pointId: row.pointId,
    from: instantText(new Date(Number(row.fromMs))),
    to: instantText(new Date(Number(row.toMs))),
    method: row.method,
    otherPointId: row.otherPointId,
    reason: row.reason,
    heatingKwh: row.heatingKwh,
    coolingKwh: row.coolingKwh,
    volumeM3: row.volumeM3,
    filledS: row.filledS,
    uncertaintyPercent: row.uncertaintyPercent,
    days: [...row.days],
    state: row.state,
    createdAt: instantText(row.createdAt),
    createdBy: row.createdByName,
    approvedAt: instantTextOrNull(row.approvedAt),
    approvedBy: row.approvedByName,
    withdrawnAt: instantTextOrNull(row.withdrawnAt),
    can: {
      approve: approveFills && row.state === "proposed",
      withdraw:
        row.state !== "withdrawn" && (row.state === "approved" ? approveFills : correctReadings),
    },
  };
}
