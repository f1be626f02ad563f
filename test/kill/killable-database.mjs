// A throw-away MariaDB in a process of its own, for tests that kill it. It prints its port as a
// line of JSON, then obeys lines on its input: "kill" ends the database without warning, "boot"
// starts it again on the same files and port; each is answered with a line when done. The end of
// its input ends everything.
import { createInterface } from "node:readline";
import { setTimeout as sleep } from "node:timers/promises";
import { bootDatabase } from "../../scripts/lib/mariadb.mjs";
import { startTicks } from "../../scripts/lib/processes.mjs";
import { startThrowAwayDatabase } from "../../scripts/lib/throw-away-database.mjs";

const tell = (message) => process.stdout.write(`${JSON.stringify(message)}\n`);

// Durable, because what must survive the kill is what was committed.
const first = await startThrowAwayDatabase({ durable: true });
let running = { pid: first.pid, stop: () => Promise.resolve() };
tell({ port: first.port });

for await (const line of createInterface({ input: process.stdin })) {
  if (line === "kill") {
    const ticks = startTicks(running.pid);
    process.kill(running.pid, "SIGKILL");
    while (ticks !== null && startTicks(running.pid) === ticks) await sleep(5);
    tell({ killed: true });
  } else if (line === "boot") {
    running = await bootDatabase(first.places, first.port, { durable: true });
    tell({ booted: true });
  }
}
await running.stop();
await first.stop();
