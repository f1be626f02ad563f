// Entry of an import worker. A worker thread knows nothing of the TypeScript loader, so this plain
// module brings it along. Our TypeScript is CommonJS, so it is required: an import would hide its
// names behind `default`.
import { createRequire } from "node:module";
import { register } from "tsx/cjs/api";

register();
const { runInWorker } = createRequire(import.meta.url)("./worker-task.ts");

export default runInWorker;
