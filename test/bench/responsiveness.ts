import { setTimeout as sleep } from "node:timers/promises";
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
  let over = false;
  const end = "busy" in until ? until.busy : sleep(until.seconds * 1000);
  const ended = end.finally(() => {
    over = true;
  });
  const took: number[] = [];
  while (!over) {
    const started = performance.now();
    await server.get("/session");
    took.push((performance.now() - started) / 1000);
    await sleep(pauseMs);
  }
  await ended;
  return { p99S: quantile(took, 0.99), calls: took.length };
}
