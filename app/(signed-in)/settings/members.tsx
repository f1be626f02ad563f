export { MembersScreen as default } from "@features/people/members-screen";
