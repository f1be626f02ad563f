import type { z } from "zod";
import type { correction as answer, correctionChange } from "@shared/contracts/corrections";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { Correction } from "@server/models/correction";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";

export interface NamedPoint {
  readonly id: string;
  readonly code: string;
  readonly loopTag: string;
}

/**
 * `points` are those it touches.
 * @param volumePercent how well the volume of the effect's days is known; null where it is not.
 */
export function presentCorrection(
  row: Correction,
  points: readonly NamedPoint[],
  actor: Actor,
  volumePercent: number | null,
): z.input<typeof answer> {
  const { correctReadings } = can(actor);
  return {
    id: row.id,
    pointId: row.pointId,
    importId: row.importId,
    points: [...points],
    change: row.change satisfies z.output<typeof correctionChange>,
    reason: row.reason,
    state: row.state,
    effect: row.state === "working" ? null : row.effect,
    volumePercent: row.state === "working" ? null : volumePercent,
    failure: row.failure && {
      code: row.failure.code,
      message: row.failure.detail,
      remedy: row.failure.remedy,
    },
    createdAt: instantText(row.createdAt),
    createdBy: row.createdByName,
    appliedAt: instantTextOrNull(row.appliedAt),
    appliedBy: row.appliedByName,
    withdrawnAt: instantTextOrNull(row.withdrawnAt),
    withdrawnBy: row.withdrawnByName,
    withdrawnReason: row.withdrawnReason,
    can: {
      apply: correctReadings && row.state === "proposed",
      withdraw: correctReadings && row.state !== "withdrawn",
    },
  };
}
