import { QueryTypes, type Transaction } from "sequelize";
import type { Database } from "@server/database/connect";
import { inTransaction } from "@server/database/transaction";
import type { JobKind, JobProgress } from "@server/models/job";
import type { Failure } from "@server/models/log-import";
import { isDeadOwner } from "./job-owner";

/** A lease runs this long after the last sign of life of the server that holds the job. */
export const LEASE_S = 10;
/** A job that ended in an error this often ends as failed. */
export const MOST_FAILURES = 3;
/** A job under which the server died this often is taken to be what kills it. */
export const MOST_INTERRUPTIONS = 50;

export interface ClaimedJob {
  readonly id: string;
  readonly organisationId: string;
  readonly kind: JobKind;
  readonly pointId: string;
  readonly importId: string | null;
  readonly logFileId: string | null;
  readonly correctionId: string | null;
  readonly revision: number | null;
  readonly failures: number;
  readonly interruptions: number;
}

export interface NewJob {
  readonly organisationId: string;
  readonly kind: JobKind;
  readonly pointId: string;
  readonly importId?: string;
  readonly logFileId?: string;
  readonly correctionId?: string;
  readonly revision?: number;
}

const waiting: JobProgress = { stage: "waiting", rowsRead: 0, rowsTotal: null, secondsLeft: null };

/** Queues a job in the transaction of what caused it; tell the runner afterwards (`poke`). */
export async function enqueueJob(
  database: Database,
  transaction: Transaction,
  job: NewJob,
): Promise<void> {
  // One that still waits will see every change made until it starts.
  const waitingKey =
    job.kind === "recalculate"
      ? `recalculate-${job.pointId}`
      : job.correctionId === undefined
        ? null
        : `correction-${job.correctionId}`;
  await database.query(
    `INSERT IGNORE INTO job (organisation_id, kind, state, point_id, import_id, log_file_id,
            correction_id, revision, waiting_key, run_after, progress, created_at)
     VALUES (:organisationId, :kind, 'queued', :pointId, :importId, :logFileId, :correctionId,
            :revision, :waitingKey, UTC_TIMESTAMP(3), :progress, UTC_TIMESTAMP(3))`,
    {
      replacements: {
        importId: null,
        logFileId: null,
        correctionId: null,
        revision: null,
        ...job,
        waitingKey,
        progress: JSON.stringify(waiting),
      },
      transaction,
    },
  );
}

/**
 * Has the energy of a point worked out anew: call it in the transaction of every change that its
 * energy depends on (fluid, pressure, service or cut-offs of the loop, the meter's side, the
 * site's zone).
 */
export async function enqueueRecalculation(
  database: Database,
  transaction: Transaction,
  of: { readonly organisationId: string; readonly pointId: string },
): Promise<void> {
  await enqueueJob(database, transaction, { ...of, kind: "recalculate" });
}

/*
 * Who comes next: organisations with fewest jobs running, then those served longest ago, so that
 * nobody's fifty files keep another's one waiting; quick jobs that a person watches before long
 * ones; then in order. Jobs that store wait while another one of their point does.
 */
const candidates = `
  SELECT j.id
    FROM job j
    LEFT JOIN (SELECT organisation_id, COUNT(*) AS jobs FROM job
                WHERE state = 'running' AND lease_until > UTC_TIMESTAMP(3)
                GROUP BY organisation_id) r ON r.organisation_id = j.organisation_id
    LEFT JOIN (SELECT organisation_id, MAX(started_at) AS at FROM job
                GROUP BY organisation_id) s ON s.organisation_id = j.organisation_id
   WHERE ((j.state = 'queued' AND j.run_after <= GREATEST(UTC_TIMESTAMP(3), :now))
       OR (j.state = 'running' AND j.lease_until <= UTC_TIMESTAMP(3)))
     AND (j.kind IN ('unpack', 'recognise', 'check', 'correction') OR NOT EXISTS (
           SELECT 1 FROM job o WHERE o.point_id = j.point_id AND o.state = 'running'
              AND o.id <> j.id AND o.lease_until > UTC_TIMESTAMP(3)
              AND o.kind IN ('import', 'undo', 'recalculate')))
   ORDER BY COALESCE(r.jobs, 0), j.kind NOT IN ('unpack', 'recognise', 'check', 'correction'), s.at, j.id
   LIMIT 8`;

/** Takes the next job for `owner`, or null where there is none. */
export async function claimJob(
  database: Database,
  owner: string,
  now: Date,
): Promise<ClaimedJob | null> {
  const found = await database.query<{ id: string }>(candidates, {
    replacements: { now },
    type: QueryTypes.SELECT,
  });
  for (const { id } of found) {
    const claimed = await inTransaction(database, (transaction) =>
      claimOne(database, transaction, id, owner),
    );
    if (claimed !== null) return claimed;
  }
  return null;
}

async function claimOne(
  database: Database,
  transaction: Transaction,
  id: string,
  owner: string,
): Promise<ClaimedJob | null> {
  const [job] = await database.query<ClaimedJob & { state: string }>(
    `SELECT id, organisation_id AS organisationId, kind, state, point_id AS pointId,
            import_id AS importId, log_file_id AS logFileId, correction_id AS correctionId, revision,
            failures,
            interruptions + (state = 'running') AS interruptions
       FROM job
      WHERE id = :id AND (state = 'queued' OR (state = 'running' AND lease_until <= UTC_TIMESTAMP(3)))
      FOR UPDATE SKIP LOCKED`,
    { replacements: { id }, type: QueryTypes.SELECT, transaction },
  );
  if (!job) return null;
  const interruptions = Number(job.interruptions);
  await database.query(
    `UPDATE job SET state = 'running', lease_owner = :owner, waiting_key = NULL,
            lease_until = UTC_TIMESTAMP(3) + INTERVAL ${LEASE_S} SECOND,
            interruptions = :interruptions, started_at = UTC_TIMESTAMP(3), progress = :progress
      WHERE id = :id`,
    {
      replacements: { id, owner, interruptions, progress: JSON.stringify(waiting) },
      transaction,
    },
  );
  return { ...job, interruptions };
}

/** Ends the leases of processes of this host that are dead, so that their jobs start at once. */
export async function releaseDeadOwners(database: Database): Promise<number> {
  const owners = await database.query<{ owner: string }>(
    "SELECT DISTINCT lease_owner AS owner FROM job WHERE state = 'running' AND lease_owner IS NOT NULL",
    { type: QueryTypes.SELECT },
  );
  const dead = owners.map(({ owner }) => owner).filter(isDeadOwner);
  if (dead.length === 0) return 0;
  await database.query(
    "UPDATE job SET lease_until = UTC_TIMESTAMP(3) WHERE state = 'running' AND lease_owner IN (:dead)",
    { replacements: { dead } },
  );
  return dead.length;
}

/** Ended jobs are of no use after a month; what they did is in imports and the audit trail. */
export async function forgetOldJobs(database: Database): Promise<void> {
  await database.query(
    `DELETE FROM job WHERE state IN ('done', 'cancelled', 'failed')
        AND finished_at < UTC_TIMESTAMP(3) - INTERVAL 30 DAY LIMIT 5000`,
  );
}

/** Renews the leases that are still ours; answers the ids of those that are not any more. */
export async function renewLeases(
  database: Database,
  owner: string,
  ids: readonly string[],
): Promise<string[]> {
  if (ids.length === 0) return [];
  await database.query(
    `UPDATE job SET lease_until = UTC_TIMESTAMP(3) + INTERVAL ${LEASE_S} SECOND
      WHERE id IN (:ids) AND lease_owner = :owner AND state = 'running'`,
    { replacements: { ids: [...ids], owner } },
  );
  const ours = await database.query<{ id: string }>(
    "SELECT id FROM job WHERE id IN (:ids) AND lease_owner = :owner AND state = 'running'",
    { replacements: { ids: [...ids], owner }, type: QueryTypes.SELECT },
  );
  const kept = new Set(ours.map(({ id }) => String(id)));
  return ids.filter((id) => !kept.has(id));
}

export async function writeProgress(
  database: Database,
  owner: string,
  id: string,
  progress: JobProgress,
): Promise<void> {
  await database.query(
    `UPDATE job SET progress = :progress
      WHERE id = :id AND lease_owner = :owner AND state = 'running'`,
    { replacements: { id, owner, progress: JSON.stringify(progress) } },
  );
}

/**
 * Marks a job done in the transaction of its effects: both are committed or neither. False where
 * the job was cancelled or another server took it over; the caller must then roll back.
 */
export async function finishJob(
  database: Database,
  transaction: Transaction,
  id: string,
  owner: string,
): Promise<boolean> {
  const [, changed] = await database.query(
    `UPDATE job SET state = 'done', lease_owner = NULL, lease_until = NULL, progress = NULL,
            finished_at = UTC_TIMESTAMP(3)
      WHERE id = :id AND lease_owner = :owner AND state = 'running'`,
    { replacements: { id, owner }, type: QueryTypes.UPDATE, transaction },
  );
  return changed === 1;
}

/** Puts a job back for another try after `delayMs`. */
export async function requeueJob(
  database: Database,
  owner: string,
  id: string,
  after: { readonly failed: boolean; readonly delayMs: number },
): Promise<void> {
  await database.query(
    `UPDATE job SET state = 'queued', lease_owner = NULL, lease_until = NULL,
            failures = failures + :failed,
            run_after = UTC_TIMESTAMP(3) + INTERVAL :delayMs * 1000 MICROSECOND
      WHERE id = :id AND lease_owner = :owner AND state = 'running'`,
    {
      replacements: { id, owner, failed: after.failed ? 1 : 0, delayMs: Math.round(after.delayMs) },
    },
  );
}

/** Ends a job as failed, and with it the import or the correction it worked for. */
export async function failJob(
  database: Database,
  owner: string,
  job: Pick<ClaimedJob, "id" | "importId" | "correctionId" | "kind">,
  failure: Failure,
): Promise<void> {
  await inTransaction(database, async (transaction) => {
    const [, changed] = await database.query(
      `UPDATE job SET state = 'failed', lease_owner = NULL, lease_until = NULL, waiting_key = NULL,
              progress = NULL, failure = :failure, finished_at = UTC_TIMESTAMP(3)
        WHERE id = :id AND lease_owner = :owner AND state = 'running'`,
      {
        replacements: { id: job.id, owner, failure: JSON.stringify(failure) },
        type: QueryTypes.UPDATE,
        transaction,
      },
    );
    if (changed !== 1) return;
    if (job.correctionId !== null)
      await database.query(
        "UPDATE correction SET state = 'failed', failure = :failure WHERE id = :id AND state = 'working'",
        {
          replacements: { id: job.correctionId, failure: JSON.stringify(failure) },
          transaction,
        },
      );
    if (job.importId === null) return;
    // An undo that failed leaves the import as it was, with the reason beside it.
    const state = job.kind === "undo" ? "" : "state = 'failed', ";
    await database.query(`UPDATE log_import SET ${state}failure = :failure WHERE id = :importId`, {
      replacements: { importId: job.importId, failure: JSON.stringify(failure) },
      transaction,
    });
  });
}

/** Cancels every job of an import that has not ended, in the caller's transaction. */
export async function cancelJobs(
  database: Database,
  transaction: Transaction,
  where: { readonly importId: string; readonly logFileId?: string },
): Promise<void> {
  await database.query(
    `UPDATE job SET state = 'cancelled', lease_owner = NULL, lease_until = NULL, waiting_key = NULL,
            progress = NULL, finished_at = UTC_TIMESTAMP(3)
      WHERE import_id = :importId AND state IN ('queued', 'running')
        AND (:logFileId IS NULL OR log_file_id = :logFileId)`,
    { replacements: { logFileId: null, ...where }, transaction },
  );
}
