import { claimJob, failJob } from "@server/jobs/job-queue";
import { runJob } from "@server/jobs/run-job";
import type { TestApp } from "./test-app";

/**
 * Runs every waiting job to its end in this thread, those they queue as well. A job that ends in an
 * error fails the test that runs it.
 */
export async function runJobs(app: TestApp): Promise<void> {
  const { database, services } = app;
  const owner = "test";
  for (;;) {
    const job = await claimJob(database, owner, app.clock.date());
    if (job === null) return;
    const outcome = await runJob(job, {
      database,
      files: services.files,
      owner,
      wanted: () => "go on",
      onProgress: () => undefined,
    });
    if (outcome.kind === "refused") await failJob(database, owner, job, outcome.failure);
    if (outcome.kind === "error")
      throw new Error(`job ${job.kind} ended in an error: ${outcome.stack ?? outcome.message}`);
  }
}
