import type { Member } from "@shared/contracts/people";
import { useFormat, useWords } from "@features/i18n";

/** An invitation whose link no longer works. */
export function hasEnded(member: Member, nowMs: number): boolean {
  const until = member.invitationExpiresAt;
  return member.state === "invited" && until !== null && Date.parse(until) <= nowMs;
}

/** What the list and the panel say of a member, in the language and clock of this device. */
export function useMemberWords() {
  const t = useWords("people");
  const format = useFormat();
  const when = (at: string) => format.dateTime(Date.parse(at));
  return {
    /** An open invitation has only its address. */
    name: (member: Member) => member.name ?? member.email,
    lastSeen: (member: Member) =>
      member.lastSeenAt ? when(member.lastSeenAt) : t("members.never"),
    /** Until when the link works, or that it has ended; null where there is no link. */
    link: (member: Member, nowMs: number) => {
      const until = member.invitationExpiresAt;
      if (until === null) return null;
      const key = hasEnded(member, nowMs) ? "expiredOn" : "until";
      return t(`members.${key}`, { when: when(until) });
    },
    state: (member: Member, nowMs: number) =>
      t(`members.${hasEnded(member, nowMs) ? "expired" : member.state}`),
  };
}
