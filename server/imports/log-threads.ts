import path from "node:path";
import { Piscina } from "piscina";
import type { LogTask } from "./log-task";

/** Looks into logs off the event loop while somebody waits for the answer. */
export interface LogThreads {
  /** The serial number above the header of a text log; null where it names none. */
  serialOf(path: string): Promise<string | null>;
  close(): Promise<void>;
}

export function createLogThreads(): LogThreads {
  const pool = new Piscina<LogTask, unknown>({
    filename: path.join(__dirname, "log-worker.mjs"),
    // What is large is a job; this is for a look in between, one at a time.
    maxThreads: 1,
    minThreads: 0,
    idleTimeout: 60_000,
  });
  return {
    async serialOf(file) {
      return (await pool.run({ kind: "serial", path: file })) as string | null;
    },
    close: () => pool.destroy(),
  };
}
