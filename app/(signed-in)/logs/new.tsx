export { StartImportScreen as default } from "@features/imports/start-import-screen";
