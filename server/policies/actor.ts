import type { Role } from "@shared/contracts/people";

/** Whoever asks: the account, the organisation they act in and their role there. */
export interface Actor {
  readonly accountId: string;
  readonly accountName: string;
  readonly organisationId: string;
  readonly membershipId: string;
  readonly role: Role;
  /** A browser or script with a session, or a script with a bearer token. */
  readonly via: "session" | "token";
  /** The session's id; null for a bearer token. */
  readonly sessionId: string | null;
}
