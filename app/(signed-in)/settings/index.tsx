export { SettingsScreen as default } from "@features/people/settings-screen";
