export { ForgottenPasswordScreen as default } from "@features/people/forgotten-password-screen";
