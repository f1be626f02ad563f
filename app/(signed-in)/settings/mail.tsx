export { MailScreen as default } from "@features/people/mail-screen";
