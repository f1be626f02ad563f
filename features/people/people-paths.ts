import { invitationPath, newPasswordPath } from "@shared/links/people-links";

/** Addresses of the screens of people. Links in letters are fixed in shared/links. */
export const peoplePaths = {
  signIn: "/sign-in",
  /** The sign-in page that leads back to what was asked for, such as `/loops/3?week=2026-W20`. */
  signInThen: (asked: string) =>
    asked === "/" ? "/sign-in" : `/sign-in?then=${encodeURIComponent(asked)}`,
  forgottenPassword: "/forgotten-password",
  newPassword: newPasswordPath,
  invitation: invitationPath,
  settings: "/settings",
  password: "/settings/password",
  members: "/settings/members",
  accessTokens: "/settings/access-tokens",
  mail: "/settings/mail",
} as const;
