import { Op, type WhereOptions } from "sequelize";
import type { z } from "zod";
import type { listMeterComparisons } from "@shared/contracts/meter-comparisons";
import type { Scope } from "@server/database/scoped";
import { pageOf, readCursor } from "@server/http/cursor";
import { MeterComparison } from "@server/models/meter-comparison";

/** Comparisons by when they were saved, newest first, a page at a time. */
export async function meterComparisonPage(
  scope: Scope,
  { cursor, limit, siteId, superseded }: z.output<(typeof listMeterComparisons)["query"]>,
): Promise<{ rows: MeterComparison[]; nextCursor: string | null }> {
  const before = readCursor(cursor);
  const conditions: WhereOptions[] = [
    ...(before === null ? [] : [{ id: { [Op.lt]: before } }]),
    ...(siteId === undefined ? [] : [{ siteId }]),
    ...(superseded ? [] : [{ supersededAt: null, withdrawnAt: null }]),
  ];
  const rows = await scope.list(MeterComparison, {
    where: { [Op.and]: conditions },
    order: [["id", "DESC"]],
    limit: limit + 1,
  });
  return pageOf(rows, limit);
}
