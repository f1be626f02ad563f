// Entry of the printing worker: laying out a page and packing its fonts takes a good tenth of a
// second, for which no other request should wait. See jobs/job-worker.mjs for why it is plain.
import { createRequire } from "node:module";
import { register } from "tsx/cjs/api";

register();
const { printWorkings } = createRequire(import.meta.url)("./workings-page.ts");

/** @param {{ model: object, printed: object }} task */
export default ({ model, printed }) => printWorkings(model, printed);
