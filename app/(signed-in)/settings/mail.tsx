export { CaughtMailScreen as default } from "@features/people/caught-mail-screen";
