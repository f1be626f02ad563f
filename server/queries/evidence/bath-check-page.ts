import { Op, type WhereOptions } from "sequelize";
import type { z } from "zod";
import type { listBathChecks } from "@shared/contracts/evidence";
import type { Scope } from "@server/database/scoped";
import { pageOf, readCursor } from "@server/http/cursor";
import { BathCheck } from "@server/models/bath-check";

/** Checks by when they were recorded, newest first, a page at a time. */
export async function bathCheckPage(
  scope: Scope,
  { cursor, limit, probeId, superseded }: z.output<(typeof listBathChecks)["query"]>,
): Promise<{ rows: BathCheck[]; nextCursor: string | null }> {
  const before = readCursor(cursor);
  const conditions: WhereOptions[] = [
    ...(before === null ? [] : [{ id: { [Op.lt]: before } }]),
    ...(probeId === undefined
      ? []
      : [{ [Op.or]: [{ firstProbeId: probeId }, { secondProbeId: probeId }] }]),
    ...(superseded ? [] : [{ supersededAt: null }]),
  ];
  const rows = await scope.list(BathCheck, {
    where: { [Op.and]: conditions },
    order: [["id", "DESC"]],
    limit: limit + 1,
  });
  return pageOf(rows, limit);
}
