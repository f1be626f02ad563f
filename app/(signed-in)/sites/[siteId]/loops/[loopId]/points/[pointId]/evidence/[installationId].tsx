export { CorrectInstallationScreen as default } from "@features/evidence/installation-form-screen";
