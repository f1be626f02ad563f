// Runs in a worker thread: bcrypt in JavaScript holds its thread for a quarter of a second at
// cost 12, and on the main thread every other request would wait for it. Plain JavaScript, because
// a worker thread knows nothing of the TypeScript loader.
import { compareSync, hashSync } from "bcryptjs";

/** @param {{ kind: "hash", password: string, cost: number } | { kind: "compare", password: string, hash: string }} task */
export default function runPasswordTask(task) {
  return task.kind === "hash"
    ? hashSync(task.password, task.cost)
    : compareSync(task.password, task.hash);
}
