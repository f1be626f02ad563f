import type { BatchDetail, BatchSummary } from "@shared/contracts/import-batches";
import { instantText } from "@server/database/conversions";
import type { ImportBatch } from "@server/models/import-batch";
import type { Site } from "@server/models/site";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import type { BatchPoint } from "@server/queries/batches/batch-points";
import type { ReportedFile } from "@server/queries/batches/batch-report";

export function presentBatch(row: ImportBatch, site: Site, fileCount: number): BatchSummary {
  return {
    id: row.id,
    site: { id: site.id, name: site.name, zone: site.zone },
    recipe: { id: row.recipeId, name: row.recipeName },
    createdBy: row.createdByName,
    createdAt: instantText(row.createdAt),
    fileCount,
  };
}

export function presentBatchDetail(
  row: ImportBatch,
  more: {
    readonly site: Site;
    readonly files: readonly ReportedFile[];
    readonly points: readonly BatchPoint[];
    readonly refused: BatchDetail["refused"];
  },
  actor: Actor,
): BatchDetail {
  const { importLogs } = can(actor);
  const ready = more.files.filter(({ isReady }) => isReady).length;
  return {
    ...presentBatch(row, more.site, more.files.length),
    files: more.files.map(({ isReady: _ready, isOpen, ...file }) => ({
      ...file,
      can: { choosePoint: importLogs && isOpen, remove: importLogs && isOpen },
    })),
    points: more.points.map(({ id, code, name, loopTag }) => ({ id, code, name, loopTag })),
    ready,
    refused: more.refused,
    can: { edit: importLogs, confirm: importLogs && ready > 0 },
  };
}
