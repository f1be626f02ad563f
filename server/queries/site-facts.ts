import { QueryTypes } from "sequelize";
import type { Database } from "@server/database/connect";
import { wholeNumber } from "@server/database/conversions";
import type { SiteFacts } from "@server/presenters/present-site";
import { pointHoldings } from "./point-holdings";

interface CountRow {
  siteId: string;
  buildings: string | number;
  loops: string | number;
}

/** Counts and holdings of sites, by site id: two queries for a whole page of them. */
export async function siteFacts(
  database: Database,
  organisationId: string,
  siteIds: readonly string[],
): Promise<(siteId: string) => SiteFacts> {
  if (siteIds.length === 0) return () => ({ buildingCount: 0, loopCount: 0, holdsFiles: false });
  const [counts, holdings] = await Promise.all([
    database.query<CountRow>(
      `SELECT s.id AS siteId,
         (SELECT COUNT(*) FROM building b WHERE b.site_id = s.id AND b.archived_at IS NULL) AS buildings,
         (SELECT COUNT(*) FROM \`loop\` l WHERE l.site_id = s.id AND l.archived_at IS NULL) AS loops
       FROM site s WHERE s.organisation_id = :organisationId AND s.id IN (:siteIds)`,
      { replacements: { organisationId, siteIds }, type: QueryTypes.SELECT },
    ),
    pointHoldings(database, organisationId, "site", siteIds),
  ]);
  const countOf = new Map(counts.map((row) => [String(row.siteId), row]));
  const holding = new Set(holdings.map((row) => row.siteId));
  return (siteId) => {
    const count = countOf.get(siteId);
    return {
      buildingCount: wholeNumber(count?.buildings ?? 0),
      loopCount: wholeNumber(count?.loops ?? 0),
      holdsFiles: holding.has(siteId),
    };
  };
}
