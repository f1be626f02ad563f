import { z } from "zod";
import { contract, id, instant, nothing, oneLine, page, pageQuery } from "./contract";

export const role = z.enum([
  "administrator",
  "surveyor",
  "engineer",
  "billingClerk",
  "tenantContact",
]);
export type Role = z.infer<typeof role>;

export const language = z.enum(["en", "de"]);
export const unitSystem = z.enum(["si", "inchPound"]);

export const email = z.email().max(254);
/** bcrypt reads 72 bytes; a longer password would be cut without a word, so it is refused. */
export const newPassword = z
  .string()
  .min(12)
  .refine((p) => new TextEncoder().encode(p).length <= 72, "at most 72 bytes");

export const session = z.object({
  account: z.object({
    id,
    name: z.string(),
    email: z.string(),
    language,
    unitSystem: unitSystem.nullable().describe("null follows the site"),
  }),
  organisation: z.object({ id, name: z.string() }),
  role,
  can: z.object({
    seeSites: z.boolean(),
    editSites: z.boolean(),
    editPoints: z.boolean(),
    importLogs: z.boolean(),
    manageMembers: z.boolean(),
    manageTokens: z.boolean(),
    seeMail: z.boolean().describe("the local mail fake keeps what was sent; development only"),
  }),
});
export type Session = z.infer<typeof session>;

export const signIn = contract({
  operationId: "signIn",
  summary: "Sign in and receive a session cookie",
  tag: "People",
  method: "post",
  path: "/session",
  body: z.object({ email, password: z.string().max(200) }),
  answer: session,
});
export const getSession = contract({
  operationId: "getSession",
  summary: "Who is signed in and what they may do",
  tag: "People",
  method: "get",
  path: "/session",
  answer: session,
});
export const signOut = contract({
  operationId: "signOut",
  summary: "End this session",
  tag: "People",
  method: "delete",
  path: "/session",
  answer: nothing,
});
export const signOutEverywhere = contract({
  operationId: "signOutEverywhere",
  summary: "End every session and token-made session of this account, this one too",
  tag: "People",
  method: "delete",
  path: "/sessions",
  answer: nothing,
});
export const updateAccount = contract({
  operationId: "updateAccount",
  summary: "Change own name, language or units",
  tag: "People",
  method: "patch",
  path: "/account",
  body: z.object({
    name: oneLine(120).optional(),
    language: language.optional(),
    unitSystem: unitSystem.nullable().optional(),
  }),
  answer: session,
});
export const changePassword = contract({
  operationId: "changePassword",
  summary: "Change own password; other sessions end",
  tag: "People",
  method: "post",
  path: "/account/password",
  body: z.object({ currentPassword: z.string().max(200), newPassword }),
  answer: nothing,
});
export const requestPasswordReset = contract({
  operationId: "requestPasswordReset",
  summary: "Send a reset link if the address is known; the answer never tells",
  tag: "People",
  method: "post",
  path: "/password-resets",
  body: z.object({ email }),
  answer: nothing,
});
export const resetPassword = contract({
  operationId: "resetPassword",
  summary: "Set a new password with the secret from a reset link",
  tag: "People",
  method: "post",
  path: "/password-resets/use",
  body: z.object({ secret: z.string().min(20).max(200), newPassword }),
  answer: nothing,
});

export const member = z.object({
  id,
  name: z.string().nullable().describe("null until the invitation is accepted"),
  email: z.string(),
  role,
  state: z.enum(["invited", "active", "disabled"]),
  invitedAt: instant.nullable(),
  invitationExpiresAt: instant.nullable(),
  lastSeenAt: instant.nullable(),
  isSelf: z.boolean(),
  can: z.object({ edit: z.boolean(), remove: z.boolean() }),
});
export type Member = z.infer<typeof member>;
const memberId = z.object({ memberId: id });

export const listMembers = contract({
  operationId: "listMembers",
  summary: "Members and open invitations of the organisation",
  tag: "People",
  method: "get",
  path: "/members",
  query: pageQuery,
  answer: page(member),
});
export const inviteMember = contract({
  operationId: "inviteMember",
  summary: "Invite somebody by e-mail; the link works once and expires",
  tag: "People",
  method: "post",
  path: "/members",
  body: z.object({ email, role }),
  answer: member,
});
export const resendInvitation = contract({
  operationId: "resendInvitation",
  summary: "Send a fresh invitation link; the earlier one stops working",
  tag: "People",
  method: "post",
  path: "/members/:memberId/invitation",
  params: memberId,
  answer: member,
});
export const updateMember = contract({
  operationId: "updateMember",
  summary: "Change a member's role, or disable and enable them",
  tag: "People",
  method: "patch",
  path: "/members/:memberId",
  params: memberId,
  body: z.object({ role: role.optional(), state: z.enum(["active", "disabled"]).optional() }),
  answer: member,
});
export const removeMember = contract({
  operationId: "removeMember",
  summary: "Remove a member or withdraw an invitation; what they did stays on record",
  tag: "People",
  method: "delete",
  path: "/members/:memberId",
  params: memberId,
  answer: nothing,
});
export const readInvitation = contract({
  operationId: "readInvitation",
  summary: "What an invitation link is for",
  tag: "People",
  method: "post",
  path: "/invitations/read",
  body: z.object({ secret: z.string().min(20).max(200) }),
  answer: z.object({
    organisationName: z.string(),
    email: z.string(),
    role,
    hasAccount: z.boolean(),
  }),
});
export const acceptInvitation = contract({
  operationId: "acceptInvitation",
  summary: "Accept an invitation: set a name and password, and be signed in",
  tag: "People",
  method: "post",
  path: "/invitations/accept",
  body: z.object({
    secret: z.string().min(20).max(200),
    name: oneLine(120),
    password: newPassword,
  }),
  answer: session,
});

export const accessToken = z.object({
  id,
  name: z.string(),
  createdAt: instant,
  expiresAt: instant.nullable(),
  lastUsedAt: instant.nullable(),
});
export const listAccessTokens = contract({
  operationId: "listAccessTokens",
  summary: "Bearer tokens for scripts, without their secrets",
  tag: "People",
  method: "get",
  path: "/access-tokens",
  answer: z.object({ items: z.array(accessToken) }),
});
export const createAccessToken = contract({
  operationId: "createAccessToken",
  summary: "Make a bearer token for a script; the secret is shown once",
  tag: "People",
  method: "post",
  path: "/access-tokens",
  body: z.object({
    name: oneLine(120),
    expiresInDays: z.number().int().min(1).max(730).nullable(),
  }),
  answer: accessToken.extend({ secret: z.string() }),
});
export const revokeAccessToken = contract({
  operationId: "revokeAccessToken",
  summary: "Revoke a bearer token",
  tag: "People",
  method: "delete",
  path: "/access-tokens/:tokenId",
  params: z.object({ tokenId: id }),
  answer: nothing,
});

export const caughtMail = z.object({
  id: z.string(),
  to: z.string(),
  subject: z.string(),
  text: z.string(),
  sentAt: instant,
});
export const listCaughtMail = contract({
  operationId: "listCaughtMail",
  summary: "What the local mail fake kept (development only)",
  tag: "Development",
  method: "get",
  path: "/development/mail",
  answer: z.object({ items: z.array(caughtMail) }),
});
