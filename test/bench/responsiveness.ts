import path from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { Worker } from "node:worker_threads";
import type { BenchServer } from "./bench-server";
import { quantile } from "./measure";

/** A person's clicks: one call after another with a short pause. */
const pauseMs = 15;

/**
 * Calls a small endpoint over and over until `busy` has ended (or for `seconds`), and answers the
 * 99th percentile of the time each call took, in seconds.
 */
export async function p99OfSmallCall(
  server: BenchServer,
  until: { readonly seconds: number } | { readonly busy: Promise<unknown> },
): Promise<{ p99S: number; calls: number }> {
  const worker = new Worker(path.join(__dirname, "small-calls.mjs"), {
    workerData: { ...server.request("/session"), pauseMs },
  });
  const times = new Promise<number[]>((resolve, reject) => {
    worker.once("message", resolve);
    worker.once("error", reject);
  });
  const end = "busy" in until ? until.busy : sleep(until.seconds * 1000);
  await Promise.race([end, times]);
  worker.postMessage("enough");
  const took = await times;
  return { p99S: quantile(took, 0.99), calls: took.length };
}
