import type { Transaction } from "sequelize";
import { enqueueRecalculation } from "@server/jobs/job-queue";
import { pointHoldings } from "@server/queries/point-holdings";
import type { Acting } from "./acting";

/*
 * Energy is stored, so a change of what it was worked out with must work it out again. This is done
 * by a job per point: a year of readings takes longer than a request should.
 */
async function recalculate(
  { database, scope }: Acting,
  of: "site" | "loop" | "point",
  id: string,
  transaction: Transaction,
): Promise<void> {
  const holdings = await pointHoldings(database, scope.organisationId, of, [id], transaction);
  // Also a point without readings yet: an import of it may be storing some at this moment, worked
  // out with what is being changed here. The job waits for it; with nothing stored it does nothing.
  for (const { pointId } of holdings) {
    const { organisationId } = scope;
    await enqueueRecalculation(database, transaction, { organisationId, pointId });
  }
}

/** Another zone: the days of every point of the site begin elsewhere. */
export function recalculateSite(acting: Acting, siteId: string, transaction: Transaction) {
  return recalculate(acting, "site", siteId, transaction);
}

/** Another fluid, pressure, service or cut-off. */
export function recalculateLoop(acting: Acting, loopId: string, transaction: Transaction) {
  return recalculate(acting, "loop", loopId, transaction);
}

/** Another meter side. */
export function recalculatePoint(acting: Acting, pointId: string, transaction: Transaction) {
  return recalculate(acting, "point", pointId, transaction);
}
