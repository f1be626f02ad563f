export { InvitationScreen as default } from "@features/people/invitation-screen";
