import { spawn } from "node:child_process";
import { fileURLToPath } from "node:url";
import { startTicks } from "./processes.mjs";

const watcherFile = fileURLToPath(new URL("./keeper-process.mjs", import.meta.url));

/**
 * Starts a small watcher that outlives this process. When this process ends for any reason, even a
 * SIGKILL, the watcher stops what was handed to it, the latest first, and removes throw-away
 * folders: a killed start leaves no server or database behind.
 */
export function startKeeper() {
  const child = spawn(process.execPath, [watcherFile], {
    detached: true, // Ctrl-C reaches the whole terminal group; the watcher must not die of it
    stdio: ["pipe", "ignore", "ignore"],
  });
  child.unref();
  child.stdin.unref?.();
  // A watcher that somebody killed must not take the product down with a broken pipe.
  child.stdin.on("error", () => undefined);
  const tell = (message) => child.stdin.write(`${JSON.stringify(message)}\n`);
  return {
    watch: (pid) => tell({ stop: pid, ticks: startTicks(pid) }),
    removeAtEnd: (folder) => tell({ remove: folder }),
    release: () => new Promise((resolve) => child.stdin.end(resolve)),
  };
}
