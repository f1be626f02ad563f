import { spawn } from "node:child_process";
import { readdirSync, readFileSync } from "node:fs";
import { setTimeout as sleep } from "node:timers/promises";

/**
 * When this process started, in clock ticks since boot, or null if it is gone or only a zombie.
 * Together with the id it tells a process from a later one that was given the same number.
 */
export function startTicks(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    // The command name stands in brackets and may itself hold spaces: count from the last bracket.
    const fields = stat.slice(stat.lastIndexOf(")") + 2).split(" ");
    return fields[0] === "Z" || fields[0] === "X" ? null : fields[19];
  } catch {
    return null;
  }
}

/** The words of a process's command line, or an empty list if it is gone or not ours to read. */
export function commandLine(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, "utf8").split("\0").filter(Boolean);
  } catch {
    return [];
  }
}

/** Ids of the running processes whose command line satisfies the test. */
export function findProcesses(test) {
  return readdirSync("/proc")
    .filter((name) => /^\d+$/.test(name))
    .map(Number)
    .filter((pid) => pid !== process.pid && startTicks(pid) !== null && test(commandLine(pid)));
}

/** Ids and start ticks of all that a process started, directly or not, its children first. */
function descendantsOf(pid) {
  const childrenOf = new Map();
  for (const other of findProcesses(() => true)) {
    const parent = parentOf(other);
    if (parent !== null) childrenOf.set(parent, [...(childrenOf.get(parent) ?? []), other]);
  }
  const found = [];
  for (let level = [pid]; level.length > 0;) {
    level = level.flatMap((id) => childrenOf.get(id) ?? []);
    found.push(...level.map((id) => ({ pid: id, ticks: startTicks(id) })));
  }
  return found;
}

function parentOf(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    return Number(stat.slice(stat.lastIndexOf(")") + 2).split(" ")[1]);
  } catch {
    return null; // it ended since it was listed
  }
}

/**
 * Asks a process to end and waits; kills it when it has not ended after `patienceMs`. What it
 * started and left behind is then stopped the same way: a test runner's workers outlive it.
 */
export async function stopProcess(pid, { ticks = startTicks(pid), patienceMs = 20_000 } = {}) {
  if (ticks === null || startTicks(pid) !== ticks) return;
  const started = descendantsOf(pid);
  await stopOne(pid, ticks, patienceMs);
  for (const child of started) await stopOne(child.pid, child.ticks, patienceMs);
}

async function stopOne(pid, ticks, patienceMs) {
  const isSame = () => ticks !== null && startTicks(pid) === ticks;
  const send = (signal) => {
    try {
      process.kill(pid, signal);
    } catch (error) {
      if (error.code !== "ESRCH") throw error; // it ended between the look and the signal
    }
  };
  if (!isSame()) return;
  send("SIGTERM");
  const deadline = Date.now() + patienceMs;
  while (isSame() && Date.now() < deadline) await sleep(50);
  if (!isSame()) return;
  send("SIGKILL");
  while (isSame()) await sleep(50);
}

/**
 * Runs a program to its end and returns its exit code and output.
 * @param {object} options `show: true` passes output through, `show: "errors"` its error stream; `input` is written to its stdin;
 * `onStart` is given the child process.
 */
export function run(command, args, { show = false, input, onStart, ...options } = {}) {
  return new Promise((resolve, reject) => {
    const output = show === true ? "inherit" : "pipe";
    const errors = show ? "inherit" : "pipe";
    const child = spawn(command, args, {
      ...options,
      stdio: [input === undefined ? "ignore" : "pipe", output, errors],
    });
    if (child.pid !== undefined) onStart?.(child);
    let text = "";
    child.stdout?.on("data", (chunk) => (text += chunk));
    child.stderr?.on("data", (chunk) => (text += chunk));
    child.on("error", reject);
    child.on("close", (code, signal) => resolve({ code: code ?? 1, signal, text }));
    if (input !== undefined) child.stdin.end(input);
  });
}
