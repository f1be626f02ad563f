import { availableParallelism } from "node:os";
import path from "node:path";
import { MessageChannel } from "node:worker_threads";
import { Piscina } from "piscina";
import type { JobProgress } from "@server/models/job";
import type { JobOutcome } from "./job-outcome";
import type { ClaimedJob } from "./job-queue";
import { Wish, type WorkerTask } from "./worker-protocol";

/** One job under way in a thread. */
export interface ThreadedJob {
  readonly outcome: Promise<JobOutcome>;
  /** Asks it to stop; a worker that does not within ten seconds is ended. */
  stop(how: "drop" | "handBack"): void;
}

export interface JobThreads {
  /** How many jobs run at a time. */
  readonly size: number;
  start(
    job: ClaimedJob,
    owner: string,
    onProgress: (progress: Omit<JobProgress, "secondsLeft">) => void,
  ): ThreadedJob;
  close(): Promise<void>;
}

const patienceMs = 10_000;

/** Worker threads for imports: one per core less one, which stays for requests and the database. */
export function createJobThreads(options: {
  readonly databaseUrl: string;
  readonly dataDir: string;
}): JobThreads {
  const size = Math.max(1, availableParallelism() - 1);
  const pool = new Piscina<WorkerTask, JobOutcome>({
    filename: path.join(__dirname, "job-worker.mjs"),
    minThreads: 0,
    maxThreads: size,
    idleTimeout: 600_000,
    concurrentTasksPerWorker: 1,
    // Columns live outside this heap, so little is needed here; a runaway ends its worker only.
    resourceLimits: { maxOldGenerationSizeMb: 1024 },
  });
  return {
    size,
    start(job, owner, onProgress) {
      const { port1, port2 } = new MessageChannel();
      port1.on("message", onProgress);
      port1.unref();
      const wish = new SharedArrayBuffer(4);
      const abort = new AbortController();
      let cut: NodeJS.Timeout | undefined;
      const task: WorkerTask = { job, owner, ...options, wish, port: port2 };
      const outcome = pool
        .run(task, { transferList: [port2], signal: abort.signal })
        .catch((error: unknown): JobOutcome => {
          if (abort.signal.aborted) {
            const handedBack = Atomics.load(new Int32Array(wish), 0) === Wish.handBack;
            return { kind: handedBack ? "handedBack" : "dropped" };
          }
          const message = error instanceof Error ? error.message : String(error);
          return {
            kind: "error",
            message,
            stack: error instanceof Error ? (error.stack ?? null) : null,
          };
        })
        .finally(() => {
          clearTimeout(cut);
          port1.close();
        });
      return {
        outcome,
        stop(how) {
          Atomics.store(new Int32Array(wish), 0, Wish[how]);
          cut ??= setTimeout(() => abort.abort(), patienceMs);
          cut.unref();
        },
      };
    },
    close: () => pool.destroy(),
  };
}
