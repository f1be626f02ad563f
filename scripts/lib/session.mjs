import { spawn } from "node:child_process";
import { startKeeper } from "./keeper.mjs";
import { run, startTicks, stopProcess } from "./processes.mjs";

const exitCodes = { SIGHUP: 129, SIGINT: 130, SIGTERM: 143 };

/**
 * One run of a script and all that it started. However the run ends (its own end, Ctrl-C, a
 * signal, or a kill that it never sees), what it started is stopped, the latest first.
 */
export function openSession() {
  const keeper = startKeeper();
  const stops = [];
  let closing = null;

  function close() {
    closing ??= (async () => {
      while (stops.length > 0) await stops.pop()();
      await keeper.release();
    })();
    return closing;
  }

  for (const [signal, code] of Object.entries(exitCodes)) {
    process.on(signal, () => {
      if (closing) return; // a second Ctrl-C must not leave half of it running
      console.log("\nStopping …");
      close().then(
        () => process.exit(code),
        (error) => {
          console.error(error);
          process.exit(1);
        },
      );
    });
  }

  /** Hands over something already running; `stop` ends it, at once when the run is over. */
  function own(pid, stop) {
    if (closing) return void stop();
    keeper.watch(pid);
    stops.push(stop);
  }

  return {
    close,
    own,
    atEnd: (action) => stops.push(action),

    /**
     * Runs a program to its end. If the session closes first, the program is stopped and this
     * never settles: the script is ending and must not take the next step.
     */
    async run(command, args, options = {}) {
      let stop = null;
      const result = await run(command, args, {
        ...options,
        onStart: (child) => {
          const ticks = startTicks(child.pid);
          stop = () => stopProcess(child.pid, { ticks });
          own(child.pid, stop);
        },
      });
      if (closing) return new Promise(() => undefined);
      if (stops.includes(stop)) stops.splice(stops.indexOf(stop), 1);
      return result;
    },

    /**
     * Starts a long-running program in its own process group, so that Ctrl-C reaches it only
     * through us and in the right order. `ended` settles with its exit code.
     */
    start(command, args, options = {}) {
      const child = spawn(command, args, { stdio: "inherit", detached: true, ...options });
      const ended = new Promise((resolve, reject) => {
        child.on("error", reject);
        child.on("exit", (code) => resolve(code ?? 1));
      });
      if (child.pid !== undefined) {
        const ticks = startTicks(child.pid);
        own(child.pid, () => stopProcess(child.pid, { ticks, patienceMs: 30_000 }));
      }
      return { pid: child.pid, ended };
    },
  };
}
