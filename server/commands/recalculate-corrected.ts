import { QueryTypes, type Transaction } from "sequelize";
import { enqueueRecalculation } from "@server/jobs/job-queue";
import type { Acting } from "./acting";

/**
 * Another installation, another side or time for a probe: where an applied offset follows one of the
 * point's probes, now or as it was recorded before, the energy is worked out anew.
 */
export async function recalculateIfProbeCorrected(
  { database, scope }: Acting,
  pointId: string,
  transaction: Transaction,
): Promise<void> {
  const { organisationId } = scope;
  const [found] = await database.query<{ corrected: number }>(
    `SELECT EXISTS (SELECT 1 FROM correction WHERE organisation_id = :organisationId
        AND kind = 'probeOffset' AND state = 'applied' AND probe_id IN (
          SELECT supply_probe_id FROM installation WHERE point_id = :pointId AND supply_probe_id IS NOT NULL
          UNION ALL
          SELECT return_probe_id FROM installation WHERE point_id = :pointId AND return_probe_id IS NOT NULL)
      ) AS corrected`,
    { replacements: { organisationId, pointId }, type: QueryTypes.SELECT, transaction },
  );
  if (Number(found?.corrected) === 1)
    await enqueueRecalculation(database, transaction, { organisationId, pointId });
}
