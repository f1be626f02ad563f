export { BatchesScreen as default } from "@features/imports/batches/batches-screen";
