export { ImportScreen as default } from "@features/imports/import-screen";
