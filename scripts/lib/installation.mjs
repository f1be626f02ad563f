import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import path from "node:path";
import { startTicks, stopProcess } from "./processes.mjs";
import { SentenceError } from "./sentence-error.mjs";

/**
 * Claims the data folder for this run, so that two runs never share one database folder. A claim
 * whose run was killed is void; a server that such a run left behind is stopped.
 * @throws SentenceError when another run is using the folder.
 */
export async function claimInstallation(settings) {
  mkdirSync(settings.dataFolder, { recursive: true, mode: 0o700 });
  const file = path.join(settings.dataFolder, "running.json");
  const holder = existsSync(file) ? readClaim(file) : null;
  if (holder && startTicks(holder.pid) === holder.ticks) {
    throw new SentenceError(
      `Loopwright is already running with the data in ${settings.dataFolder} (process ${holder.pid}): stop it there first, or set LOOPWRIGHT_DATA_DIR to another folder.`,
    );
  }
  const left = holder?.server;
  if (left) await stopProcess(left.pid, { ticks: left.ticks });
  const claim = { pid: process.pid, ticks: startTicks(process.pid) };
  writeFileSync(file, JSON.stringify(claim));
  return {
    /** Notes the server's process, so that the next run can find it if this one is killed. */
    noteServer: (pid) =>
      writeFileSync(file, JSON.stringify({ ...claim, server: { pid, ticks: startTicks(pid) } })),
    release: () => rmSync(file, { force: true }),
  };
}

function readClaim(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch (error) {
    if (error instanceof SyntaxError) return null; // cut short by a kill: says nothing
    throw error;
  }
}
