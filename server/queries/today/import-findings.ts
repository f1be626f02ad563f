import { QueryTypes } from "sequelize";
import { DAY_MS } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import type { Finding } from "./reading-findings";

interface Row {
  id: string;
  state: "asking" | "ready" | "failed" | "imported";
  rowsStored: number | null;
  fileName: string | null;
  fileCount: string | number;
  loopId: string;
  tag: string;
  service: "chilled" | "hot" | "changeover";
}

/** What the last weeks' imports of a site wait for, and what the last day's brought. */
const lookBackDays = 30;
const mostImports = 200;

export async function importFindings(
  { scope, database }: { scope: Scope; database: Database },
  siteId: string,
  nowMs: number,
): Promise<Finding[]> {
  const rows = await database.query<Row>(
    `SELECT i.id, i.state, i.rows_stored AS rowsStored,
            (SELECT f.name FROM log_file f WHERE f.import_id = i.id ORDER BY f.id LIMIT 1) AS fileName,
            (SELECT COUNT(*) FROM log_file f WHERE f.import_id = i.id) AS fileCount,
            l.id AS loopId, l.tag, l.service
       FROM log_import i
       JOIN metering_point p ON p.id = i.point_id
       JOIN \`loop\` l ON l.id = p.loop_id
      WHERE i.organisation_id = :organisationId AND l.site_id = :siteId
        AND (i.state IN ('asking', 'ready', 'failed') AND i.created_at >= :since
             OR i.state = 'imported' AND i.imported_at >= :yesterday)
      ORDER BY i.id DESC LIMIT ${mostImports}`,
    {
      replacements: {
        organisationId: scope.organisationId,
        siteId,
        since: new Date(nowMs - lookBackDays * DAY_MS),
        yesterday: new Date(nowMs - DAY_MS),
      },
      type: QueryTypes.SELECT,
    },
  );
  const waiting = rows.filter((row) => row.state !== "imported").map(findingOf);
  return [...waiting, ...doneFinding(rows.filter((row) => row.state === "imported"))];
}

/** However many imports ended, one sentence says so: it is news, not work. */
function doneFinding(rows: readonly Row[]): Finding[] {
  const [newest] = rows;
  if (newest === undefined) return [];
  const one = findingOf(newest);
  const files = rows.reduce((sum, row) => sum + Number(row.fileCount), 0);
  const stored = rows.reduce((sum, row) => sum + (row.rowsStored ?? 0), 0);
  return [
    {
      ...one,
      loop: rows.length === 1 ? one.loop : null,
      values: { ...one.values, moreFiles: Math.max(0, files - 1), rows: stored },
    },
  ];
}

function findingOf(row: Row): Finding {
  const code = (
    {
      asking: "importAsks",
      ready: "importAsks",
      failed: "importFailed",
      imported: "importDone",
    } as const
  )[row.state];
  return {
    weight: row.state === "failed" ? "stop" : row.state === "imported" ? "note" : "look",
    code,
    loop: { id: String(row.loopId), tag: row.tag, service: row.service },
    values: {
      file: row.fileName ?? "",
      moreFiles: Math.max(0, Number(row.fileCount) - 1),
      rows: row.rowsStored ?? 0,
    },
    link: { to: "import", importId: String(row.id) },
  };
}
