import { invitationPath, newPasswordPath } from "@shared/links/people-links";

/** Addresses of the screens of people. Links in letters are fixed in shared/links. */
export const peoplePaths = {
  signIn: "/sign-in",
  forgottenPassword: "/forgotten-password",
  newPassword: newPasswordPath,
  invitation: invitationPath,
  settings: "/settings",
  members: "/settings/members",
  tokens: "/settings/tokens",
  password: "/settings/password",
  mail: "/settings/mail",
} as const;
