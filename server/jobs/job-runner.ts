import { setTimeout as sleep } from "node:timers/promises";
import type { Logger } from "pino";
import type { Clock } from "@server/clock";
import type { Database } from "@server/database/connect";
import type { JobProgress } from "@server/models/job";
import type { Failure } from "@server/models/log-import";
import { isDatabaseAway, type JobOutcome } from "./job-outcome";
import { newOwner } from "./job-owner";
import {
  claimJob,
  failJob,
  forgetOldJobs,
  MOST_FAILURES,
  MOST_INTERRUPTIONS,
  releaseDeadOwners,
  renewLeases,
  requeueJob,
  writeProgress,
  type ClaimedJob,
} from "./job-queue";
import type { JobThreads, ThreadedJob } from "./job-threads";
import { TimeLeft } from "./time-left";

/** What the rest of the server may tell the runner. */
export interface JobSignals {
  /** A job was queued and committed. */
  poke(): void;
  /** Jobs of this import were cancelled in the database. */
  dropImport(importId: string): void;
}

interface Running {
  readonly job: ClaimedJob;
  readonly thread: ThreadedJob;
  readonly timeLeft: TimeLeft;
  progress: JobProgress | null;
  isWritten: boolean;
}

const pollMs = 500;
const renewMs = 2_500;
const progressMs = 250;

const unforeseen: Failure = {
  code: "job-error",
  detail: "The work stopped on an unforeseen error three times.",
  remedy: "Try again. If it stops again, tell whoever runs the server: its log has the details.",
};
const deadly: Failure = {
  code: "job-interrupted",
  detail: "The server ended while working on this, again and again.",
  remedy: "Tell whoever runs the server: this file may need more memory than it has.",
};

/**
 * Claims jobs, runs them in worker threads, keeps their leases and records how they ended. One per
 * server; several servers on one database share the work.
 */
export class JobRunner implements JobSignals {
  private readonly owner = newOwner();
  private readonly running = new Map<string, Running>();
  private readonly timers: NodeJS.Timeout[] = [];
  private loop: Promise<void> | null = null;
  private stopping = false;
  private wake: (() => void) | null = null;
  private isAway = false;

  constructor(
    private readonly database: Database,
    private readonly threads: JobThreads,
    private readonly clock: Clock,
    private readonly log: Logger,
  ) {}

  start(): void {
    if (this.loop) return;
    this.timers.push(
      setInterval(() => void this.guarded(() => this.renew()), renewMs),
      setInterval(() => void this.guarded(() => this.writeAllProgress()), progressMs),
    );
    this.loop = this.run();
  }

  /** Stops claiming, hands running jobs back and waits for their workers. May be called again. */
  async stop(): Promise<void> {
    if (this.stopping) return;
    this.stopping = true;
    this.poke();
    await this.loop;
    for (const { thread } of this.running.values()) thread.stop("handBack");
    while (this.running.size > 0) await sleep(20);
    for (const timer of this.timers) clearInterval(timer);
    await this.threads.close();
  }

  poke(): void {
    this.wake?.();
  }

  dropImport(importId: string): void {
    for (const { job, thread } of this.running.values())
      if (job.importId === importId) thread.stop("drop");
  }

  private async run(): Promise<void> {
    await this.guarded(async () => {
      const dead = await releaseDeadOwners(this.database);
      if (dead > 0) this.log.info({ dead }, "took over the jobs of servers that died");
      await forgetOldJobs(this.database);
    });
    while (!this.stopping) {
      const claimed = await this.guarded(() => this.claimSome());
      if (!claimed) await this.pause();
    }
  }

  private async claimSome(): Promise<boolean> {
    if (this.running.size >= this.threads.size) return false;
    const job = await claimJob(this.database, this.owner, this.clock.date());
    if (job === null) return false;
    if (job.interruptions >= MOST_INTERRUPTIONS) {
      await failJob(this.database, this.owner, job, deadly);
      return true;
    }
    this.begin(job);
    return true;
  }

  private begin(job: ClaimedJob): void {
    const timeLeft = new TimeLeft();
    const thread = this.threads.start(job, this.owner, (progress) => {
      const running = this.running.get(job.id);
      if (!running) return;
      running.progress = { ...progress, secondsLeft: timeLeft.after(progress, performance.now()) };
      running.isWritten = false;
    });
    this.running.set(job.id, { job, thread, timeLeft, progress: null, isWritten: true });
    void thread.outcome.then((outcome) => this.settle(job, outcome));
  }

  /** Records the end; while the database is away it tries until that worked. */
  private async settle(job: ClaimedJob, outcome: JobOutcome): Promise<void> {
    for (;;) {
      try {
        await this.record(job, outcome);
        break;
      } catch (error) {
        this.note(error);
        if (this.stopping) break; // the lease runs out and the next server takes the job
        await sleep(pollMs);
      }
    }
    this.running.delete(job.id);
    this.poke();
  }

  private async record(job: ClaimedJob, outcome: JobOutcome): Promise<void> {
    const { database, owner, log } = this;
    if (outcome.kind === "refused") {
      log.info({ job: job.id, work: job.kind, code: outcome.failure.code }, "job refused");
      await failJob(database, owner, job, outcome.failure);
    } else if (outcome.kind === "handedBack") {
      await requeueJob(database, owner, job.id, { failed: false, delayMs: 0 });
    } else if (outcome.kind === "error") {
      const failures = Number(job.failures) + 1;
      const { message, stack } = outcome;
      log.error({ job: job.id, work: job.kind, failures, message, stack }, "job ended in an error");
      if (failures >= MOST_FAILURES) await failJob(database, owner, job, unforeseen);
      else
        await requeueJob(database, owner, job.id, { failed: true, delayMs: 500 * 2 ** failures });
    }
  }

  private async renew(): Promise<void> {
    const lost = await renewLeases(this.database, this.owner, [...this.running.keys()]);
    for (const id of lost) this.running.get(id)?.thread.stop("drop");
  }

  private async writeAllProgress(): Promise<void> {
    for (const running of this.running.values()) {
      if (running.isWritten || running.progress === null) continue;
      running.isWritten = true;
      await writeProgress(this.database, this.owner, running.job.id, running.progress);
    }
  }

  private async pause(): Promise<void> {
    if (this.stopping) return;
    await new Promise<void>((resolve) => {
      const timer = setTimeout(resolve, pollMs);
      this.wake = () => {
        clearTimeout(timer);
        resolve();
      };
    });
    this.wake = null;
  }

  /** Runs one round; a database that is away only makes it wait, said once in the log. */
  private async guarded<Result>(work: () => Promise<Result>): Promise<Result | undefined> {
    try {
      const result = await work();
      if (this.isAway) this.log.info("the database is back");
      this.isAway = false;
      return result;
    } catch (error) {
      this.note(error);
      return undefined;
    }
  }

  private note(error: unknown): void {
    if (!isDatabaseAway(error)) this.log.error({ err: error }, "the job runner met an error");
    else if (!this.isAway) this.log.warn("the database is away; jobs wait for it");
    this.isAway ||= isDatabaseAway(error);
  }
}
