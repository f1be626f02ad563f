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

/** Asks a process to end and waits; kills it when it has not ended after `patienceMs`. */
export async function stopProcess(pid, { ticks = startTicks(pid), patienceMs = 20_000 } = {}) {
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
