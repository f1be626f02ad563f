export { AccountScreen as default } from "@features/people/account-screen";
