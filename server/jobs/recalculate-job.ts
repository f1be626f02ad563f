import { inTransaction } from "@server/database/transaction";
import { lockPoint, recalculateEnergy } from "@server/readings/recalculate-energy";
import type { JobContext } from "./job-context";

/** Works the energy of a point out anew after a change of what it depends on. */
export async function recalculateJob(context: JobContext): Promise<void> {
  const { database, job } = context;
  await inTransaction(database, async (transaction) => {
    await lockPoint(database, transaction, job.pointId);
    await recalculateEnergy(database, transaction, job.pointId, null, {
      onProgress: (share) => {
        context.checkpoint();
        context.report({ stage: "energy", rowsRead: Math.round(share * 100), rowsTotal: 100 });
      },
    });
    await context.finish(transaction);
  });
}
