export { BatchScreen as default } from "@features/imports/batches/batch-screen";
