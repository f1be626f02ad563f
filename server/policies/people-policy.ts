import type { Actor } from "./actor";

interface MemberRecord {
  readonly id: string;
  readonly organisationId: string;
}

/** Members, tokens, the organisation. */
export function peopleAbilities({ role, via, organisationId }: Actor) {
  const administers = role === "administrator";
  const administersThis = (member: MemberRecord): boolean =>
    administers && member.organisationId === organisationId;
  return {
    manageMembers: administers,
    /**
     * Only by somebody signed in: a token that leaked must not be able to make further tokens that
     * outlive its revocation.
     */
    manageTokens: administers && via === "session",
    /** Own password, language, sessions: a script acts for somebody but is not that person. */
    changeOwnAccount: via === "session",
    /** Letters the local mail fake kept; they hold live links of everybody. */
    readCaughtMail: administers && via === "session",
    /** That an organisation keeps one active administrator is a rule of the command, not of here. */
    editMember: administersThis,
    removeMember: administersThis,
  };
}
