import { inTransaction } from "@server/database/transaction";
import { Correction } from "@server/models/correction";
import { touchedPoints } from "@server/queries/corrections/touched-points";
import { correctionEffect } from "@server/readings/correction-effects";
import type { JobContext } from "./job-context";

/**
 * Works out what a proposed correction would change. Only the last transaction writes, and it writes
 * the effect and the job's end together: killed at any moment, it starts again from nothing.
 */
export async function correctionEffectJob(context: JobContext): Promise<void> {
  const { database, job } = context;
  const id = job.correctionId;
  if (id === null) throw new Error("a correction's job names no correction");
  const correction = await Correction.findOne({
    where: { id, organisationId: job.organisationId },
  });
  const weighed =
    correction?.state === "working"
      ? await correctionEffect(
          database,
          {
            id: correction.id,
            change: correction.change,
            pointIds: await touchedPoints(database, correction),
          },
          () => context.checkpoint(),
        )
      : null;
  await inTransaction(database, async (transaction) => {
    // Withdrawn meanwhile, it needs no effect.
    if (weighed !== null)
      await Correction.update(
        { state: "proposed", effect: weighed, failure: null },
        { where: { id, state: "working" }, transaction },
      );
    await context.finish(transaction);
  });
}
