export { SignInScreen as default } from "@features/people/sign-in-screen";
