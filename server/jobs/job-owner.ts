import { randomBytes } from "node:crypto";
import { readFileSync } from "node:fs";
import os from "node:os";

/*
 * A lease names who holds it as host:pid:start:chance, so that a server which starts on the same
 * machine can tell at once that the process which held a job is dead, instead of waiting for the
 * lease to run out.
 */

/** Ticks since boot at which a process started; null where it is gone or this is not Linux. */
function startOf(pid: number): string | null {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    // The command name stands in brackets and may hold spaces: count from the last bracket.
    const fields = stat.slice(stat.lastIndexOf(")") + 2).split(" ");
    return fields[0] === "Z" ? null : (fields[19] ?? null);
  } catch {
    return null;
  }
}

/** This process's name on leases, at most 160 characters. */
export function newOwner(): string {
  const start = startOf(process.pid) ?? "0";
  return [os.hostname().slice(0, 80), process.pid, start, randomBytes(6).toString("hex")].join(":");
}

/** Whether this owner certainly is dead: it ran on this host and its process is gone. */
export function isDeadOwner(owner: string): boolean {
  const [host, pid, start] = owner.split(":");
  if (host !== os.hostname().slice(0, 80) || pid === undefined || start === "0") return false;
  return startOf(Number(pid)) !== start;
}
