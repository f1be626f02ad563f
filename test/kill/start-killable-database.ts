import { spawn } from "node:child_process";
import path from "node:path";
import { createInterface } from "node:readline";

export interface KillableDatabase {
  readonly port: number;
  /** Ends it as a power cut would. */
  kill(): Promise<void>;
  boot(): Promise<void>;
  stop(): Promise<void>;
}

/** A durable MariaDB of its own that a test may kill and boot again. */
export async function startKillableDatabase(): Promise<KillableDatabase> {
  const child = spawn(process.execPath, [path.join(__dirname, "killable-database.mjs")], {
    stdio: ["pipe", "pipe", "inherit"],
  });
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  const answer = async (): Promise<Record<string, unknown>> => {
    const { value, done } = await lines.next();
    if (done) throw new Error("the database's keeper ended");
    return JSON.parse(String(value)) as Record<string, unknown>;
  };
  const ask = async (what: string): Promise<void> => {
    child.stdin.write(`${what}\n`);
    await answer();
  };
  const { port } = await answer();
  return {
    port: Number(port),
    kill: () => ask("kill"),
    boot: () => ask("boot"),
    async stop() {
      const gone = new Promise((resolve) => child.once("exit", resolve));
      child.stdin.end();
      await gone;
    },
  };
}
