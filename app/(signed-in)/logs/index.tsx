export { LogsScreen as default } from "@features/imports/logs-screen";
