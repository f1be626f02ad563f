import type { MessagePort } from "node:worker_threads";
import type { ClaimedJob } from "./job-queue";

/** What the main thread hands a worker; everything in it can cross threads. */
export interface WorkerTask {
  readonly job: ClaimedJob;
  readonly owner: string;
  readonly databaseUrl: string;
  readonly dataDir: string;
  /** One Int32: {@link Wish}. Shared, so that a loop over rows can look at it without waiting. */
  readonly wish: SharedArrayBuffer;
  /** Takes progress out. */
  readonly port: MessagePort;
}

/** What the server wants of a job under way. */
export const Wish = { goOn: 0, drop: 1, handBack: 2 } as const;
