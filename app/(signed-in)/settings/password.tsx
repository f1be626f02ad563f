export { ChangePasswordScreen as default } from "@features/people/change-password-screen";
