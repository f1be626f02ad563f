export { NewInstallationScreen as default } from "@features/evidence/installation-form-screen";
