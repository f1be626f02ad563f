import type { Logger } from "pino";
import type { Clock } from "./clock";
import type { Config } from "./config";
import type { Database } from "./database/connect";
import type { FileStore } from "./files/file-store";
import type { LogThreads } from "./imports/log-threads";
import type { JobRunner } from "./jobs/job-runner";
import type { Printer } from "./print/printer";
import type { Passwords } from "./security/passwords";

/** What lives as long as the process; made once by main.ts and by the test app. */
export interface Services {
  readonly config: Config;
  readonly database: Database;
  readonly clock: Clock;
  readonly log: Logger;
  readonly passwords: Passwords;
  readonly printer: Printer;
  readonly files: FileStore;
  readonly logs: LogThreads;
  /** Poke it after queueing a job; it runs once the server has started it. */
  readonly jobs: JobRunner;
}
