import type { MeterComparisonResult } from "@shared/contracts/meter-comparisons";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import { MeterComparison } from "@server/models/meter-comparison";
import { loadOnePointReadings } from "@server/readings/point-readings";

/** What a saved comparison says today beside what was saved. */
export interface ComparisonSurroundings {
  readonly readingsChanged: boolean;
  readonly supersededById: string | null;
}

export async function comparisonSurroundings(
  { database, scope }: { readonly database: Database; readonly scope: Scope },
  row: MeterComparison,
): Promise<ComparisonSurroundings> {
  const [readingsChanged, later] = await Promise.all([
    haveReadingsChanged(database, scope, row.result),
    scope.find(MeterComparison, { where: { supersedesId: row.id }, attributes: ["id"] }),
  ]);
  return { readingsChanged, supersededById: later?.id ?? null };
}

async function haveReadingsChanged(
  database: Database,
  { organisationId }: Scope,
  { first, second }: MeterComparisonResult,
): Promise<boolean> {
  for (const { point } of [first, second]) {
    if (point === null) continue;
    const now = await loadOnePointReadings(database, organisationId, point.pointId);
    if (now.revision !== point.revision) return true;
  }
  return false;
}
