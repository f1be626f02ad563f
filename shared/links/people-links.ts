/**
 * Addresses of screens that letters point at. The secret stands after the `#`, which browsers never
 * send to a server, so it appears in no log of ours or of a proxy's.
 */
export const invitationPath = "/invitation";
export const newPasswordPath = "/new-password";

/** `path#secret`; secrets are base64url and need no encoding. */
export function linkWithSecret(publicUrl: string, path: string, secret: string): string {
  return `${publicUrl}${path}#${secret}`;
}
