import path from "node:path";
import { Piscina } from "piscina";
import type { Workings } from "@shared/contracts/workings";
import type { PrintedFor } from "./workings-page";

/** Prints pages off the event loop. */
export interface Printer {
  /** A4, as PDF. */
  workings(model: Workings, printed: PrintedFor): Promise<Buffer>;
  close(): Promise<void>;
}

export function createPrinter(): Printer {
  const pool = new Piscina<object, Uint8Array>({
    filename: path.join(__dirname, "print-worker.mjs"),
    // Paper is asked for seldom: one page at a time, and no thread while nobody prints.
    maxThreads: 1,
    minThreads: 0,
    idleTimeout: 30_000,
  });
  return {
    async workings(model, printed) {
      return Buffer.from(await pool.run({ model, printed }));
    },
    close: () => pool.destroy(),
  };
}
