import { Op } from "sequelize";
import type { Workings } from "@shared/contracts/workings";
import type { CorrectionChange } from "@shared/contracts/corrections";
import { spansOverlap } from "@shared/domain/readings/corrections/correction-span";
import type { Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { Scope } from "@server/database/scoped";
import type { Correction } from "@server/models/correction";
import { EnergyFill } from "@server/models/energy-fill";
import { spanOfChange } from "@server/readings/point-corrections";
import { correctionsOfPoint } from "@server/queries/corrections/list-corrections";

/** Applied corrections that reach into a range, newest first. */
export async function correctionsBehind(
  context: { readonly database: Database; readonly scope: Scope },
  pointId: string,
  range: Interval,
  fileIds: readonly string[],
): Promise<Correction[]> {
  const all = await correctionsOfPoint(context, pointId);
  return all.filter((row) => row.state === "applied" && reachesInto(row.change, range, fileIds));
}

function reachesInto(
  change: CorrectionChange,
  range: Interval,
  fileIds: readonly string[],
): boolean {
  if ("logFileId" in change) return fileIds.includes(change.logFileId);
  const span = spanOfChange(change);
  return span !== null && spansOverlap(span, range);
}

export function presentCorrections(rows: readonly Correction[]): Workings["corrections"] {
  return rows.map(({ id, change, reason, appliedAt, appliedByName }) => ({
    id,
    change,
    reason,
    appliedAt: instantTextOrNull(appliedAt),
    appliedBy: appliedByName,
  }));
}

/** Fills that stand in a range, proposed or approved: beside the figure, never in it. */
export async function fillsBehind(
  scope: Scope,
  pointId: string,
  range: Interval,
): Promise<EnergyFill[]> {
  return scope.list(EnergyFill, {
    where: {
      pointId,
      state: ["proposed", "approved"],
      fromMs: { [Op.lt]: range.endMs },
      toMs: { [Op.gt]: range.startMs },
    },
    order: [["fromMs", "ASC"]],
  });
}

export function presentFills(rows: readonly EnergyFill[]): Workings["fills"] {
  return rows.map((row) => ({
    id: row.id,
    from: instantText(new Date(Number(row.fromMs))),
    to: instantText(new Date(Number(row.toMs))),
    method: row.method,
    heatingKwh: row.heatingKwh,
    coolingKwh: row.coolingKwh,
    uncertaintyPercent: row.uncertaintyPercent,
    state: row.state,
  }));
}
