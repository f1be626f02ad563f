import { mkdtemp, open, rm, type FileHandle } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import type { Readable } from "node:stream";
import { Piscina } from "piscina";
import type { LogTask } from "./log-task";
import type { ProblemTask } from "./problem-rows-csv";

/** Looks into logs off the event loop while somebody waits for the answer. */
export interface LogThreads {
  /** The serial number above the header of a text log; null where it names none. */
  serialOf(path: string): Promise<string | null>;
  /** Every row with a problem as CSV; nothing of it stays on the disk. */
  problemRows(
    asked: Omit<ProblemTask, "kind" | "target">,
  ): Promise<{ body: Readable; byteLength: number }>;
  close(): Promise<void>;
}

function createPool(): Piscina<LogTask, string | null> {
  return new Piscina<LogTask, string | null>({
    filename: path.join(__dirname, "log-worker.mjs"),
    // One at a time: a large file takes the memory of an import.
    maxThreads: 1,
    minThreads: 0,
    idleTimeout: 60_000,
  });
}

export function createLogThreads(): LogThreads {
  // A short look does not wait behind a long one.
  const short = createPool();
  const long = createPool();
  return {
    serialOf: (file) => short.run({ kind: "serial", path: file }),
    async problemRows(asked) {
      const folder = await mkdtemp(path.join(os.tmpdir(), "loopwright-problems-"));
      try {
        const target = path.join(folder, "rows.csv");
        await long.run({ kind: "problems", ...asked, target });
        return await streamOf(await open(target, "r"));
      } finally {
        // What is open can be read to its end, though its name is gone.
        await rm(folder, { recursive: true, force: true });
      }
    },
    async close() {
      await short.destroy();
      await long.destroy();
    },
  };
}

async function streamOf(file: FileHandle): Promise<{ body: Readable; byteLength: number }> {
  const { size: byteLength } = await file.stat();
  return { body: file.createReadStream(), byteLength };
}
