// A thread of its own, so that what the bench uploads meanwhile does not delay these calls.
import { setTimeout as sleep } from "node:timers/promises";
import { parentPort, workerData } from "node:worker_threads";

const { url, headers, pauseMs } = workerData;
let over = false;
parentPort.once("message", () => (over = true));

const took = [];
while (!over) {
  const started = performance.now();
  const answer = await fetch(url, { headers });
  await answer.text();
  if (!answer.ok) throw new Error(`${url}: ${answer.status}`);
  took.push((performance.now() - started) / 1000);
  await sleep(pauseMs);
}
parentPort.postMessage(took);
