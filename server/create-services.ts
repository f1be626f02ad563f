import { FolderFileStore } from "./files/folder-file-store";
import { createLogThreads } from "./imports/log-threads";
import { JobRunner } from "./jobs/job-runner";
import { createJobThreads } from "./jobs/job-threads";
import { createPrinter } from "./print/printer";
import { createPasswords } from "./security/passwords";
import type { Services } from "./services";

type Given = Pick<Services, "config" | "database" | "clock" | "log">;

/** Makes what lives as long as the process around a connected, migrated database. */
export async function createServices(given: Given): Promise<Services> {
  const { config, database, clock, log } = given;
  const threads = createJobThreads({ databaseUrl: config.databaseUrl, dataDir: config.dataDir });
  return {
    ...given,
    passwords: createPasswords(config.passwordCost),
    printer: createPrinter(),
    files: new FolderFileStore(config.dataDir),
    logs: createLogThreads(),
    jobs: new JobRunner(database, threads, clock, log),
  };
}

/** Lets go of everything in the reverse order; the database last. */
export async function closeServices(services: Services): Promise<void> {
  await services.jobs.stop();
  await services.logs.close();
  await services.printer.close();
  await services.passwords.close();
  await services.database.close();
}
