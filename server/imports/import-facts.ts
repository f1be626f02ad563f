import { QueryTypes } from "sequelize";
import type { Scope } from "@server/database/scoped";
import type { Database } from "@server/database/connect";
import type { JobProgress } from "@server/models/job";
import { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";

/** Where an import belongs. */
export interface ImportPlace {
  readonly pointId: string;
  readonly pointCode: string;
  readonly pointName: string;
  readonly pointArchived: boolean;
  readonly meterSide: "supply" | "return";
  readonly loopId: string;
  readonly loopTag: string;
  readonly loopName: string;
  readonly service: "chilled" | "hot" | "changeover";
  readonly gaugePressureMPa: number | null;
  readonly siteId: string;
  readonly siteName: string;
  readonly zone: string;
  readonly buildingName: string | null;
}

/** What a list of imports needs beside the rows themselves, in three queries however many there are. */
export interface ImportFacts {
  readonly places: Map<string, ImportPlace>;
  readonly fileNames: Map<string, string[]>;
  readonly jobs: Map<string, { kind: string; progress: JobProgress | null }>;
}

export async function importFacts(
  { database, scope }: { database: Database; scope: Scope },
  rows: readonly LogImport[],
): Promise<ImportFacts> {
  if (rows.length === 0) return { places: new Map(), fileNames: new Map(), jobs: new Map() };
  const ids = rows.map(({ id }) => id);
  const [places, files, jobs] = await Promise.all([
    placesOf(database, scope.organisationId, [...new Set(rows.map(({ pointId }) => pointId))]),
    scope.list(LogFile, {
      attributes: ["id", "importId", "name"],
      where: { importId: ids },
      order: [["id", "ASC"]],
    }),
    jobsOf(database, scope.organisationId, ids),
  ]);
  const fileNames = new Map<string, string[]>();
  for (const { importId, name } of files)
    fileNames.set(importId, [...(fileNames.get(importId) ?? []), name]);
  return { places, fileNames, jobs };
}

async function placesOf(database: Database, organisationId: string, pointIds: readonly string[]) {
  const rows = await database.query<Omit<ImportPlace, "pointArchived"> & { pointArchived: number }>(
    `SELECT p.id AS pointId, p.code AS pointCode, p.name AS pointName,
            p.archived_at IS NOT NULL AS pointArchived, p.meter_side AS meterSide,
            l.id AS loopId, l.tag AS loopTag, l.name AS loopName, l.service,
            l.gauge_pressure_mpa AS gaugePressureMPa,
            s.id AS siteId, s.name AS siteName, s.zone, b.name AS buildingName
       FROM metering_point p JOIN \`loop\` l ON l.id = p.loop_id JOIN site s ON s.id = l.site_id
       LEFT JOIN building b ON b.id = l.building_id
      WHERE p.organisation_id = :organisationId AND p.id IN (:pointIds)`,
    { replacements: { organisationId, pointIds: [...pointIds] }, type: QueryTypes.SELECT },
  );
  return new Map(
    rows.map((row) => [row.pointId, { ...row, pointArchived: Number(row.pointArchived) === 1 }]),
  );
}

async function jobsOf(database: Database, organisationId: string, importIds: readonly string[]) {
  const rows = await database.query<{ importId: string; kind: string; progress: string | null }>(
    `SELECT import_id AS importId, kind, progress FROM job
      WHERE organisation_id = :organisationId AND import_id IN (:importIds)
        AND state IN ('queued', 'running') ORDER BY state = 'running', id DESC`,
    { replacements: { organisationId, importIds: [...importIds] }, type: QueryTypes.SELECT },
  );
  return new Map(
    rows.map(({ importId, kind, progress }) => [
      importId,
      { kind, progress: progress === null ? null : (JSON.parse(progress) as JobProgress) },
    ]),
  );
}
