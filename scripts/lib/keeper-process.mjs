// Runs on its own, see keeper.mjs. Its stdin is a pipe from the process it watches; the end of that
// pipe is the one sign of death no signal can suppress.
import { rm } from "node:fs/promises";
import { createInterface } from "node:readline";
import { stopProcess } from "./processes.mjs";

for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => undefined);

const processes = [];
const folders = [];
for await (const line of createInterface({ input: process.stdin })) {
  const message = JSON.parse(line);
  if (message.stop) processes.unshift(message);
  if (message.remove) folders.push(message.remove);
}
for (const { stop, ticks } of processes) await stopProcess(stop, { ticks });
for (const folder of folders) await rm(folder, { recursive: true, force: true });
