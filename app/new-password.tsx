export { NewPasswordScreen as default } from "@features/people/new-password-screen";
