import { QueryTypes } from "sequelize";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";

export interface BatchPoint {
  readonly id: string;
  readonly code: string;
  readonly name: string;
  readonly loopTag: string;
}

/** The points in use of a site, by loop and code. */
export function batchPoints(
  { database, scope }: { readonly database: Database; readonly scope: Scope },
  siteId: string,
): Promise<BatchPoint[]> {
  return database.query<BatchPoint>(
    `SELECT p.id, p.code, p.name, l.tag AS loopTag
       FROM metering_point p JOIN \`loop\` l ON l.id = p.loop_id
      WHERE l.site_id = :siteId AND p.organisation_id = :organisationId AND p.archived_at IS NULL
      ORDER BY l.tag, p.code, p.id`,
    {
      replacements: { siteId, organisationId: scope.organisationId },
      type: QueryTypes.SELECT,
    },
  );
}
