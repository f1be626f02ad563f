// Entry of the thread that looks into logs; see jobs/job-worker.mjs for why it is plain.
import { createRequire } from "node:module";
import { register } from "tsx/cjs/api";

register();
const { runLogTask } = createRequire(import.meta.url)("./log-task.ts");

export default runLogTask;
