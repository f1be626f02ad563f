import type { Member } from "@shared/contracts/people";
import { useWords } from "@features/i18n";

import { useWhen } from "./use-when";

/** An invitation whose link no longer works. */
export function hasEnded(member: Member, nowMs: number): boolean {
  const until = member.invitationExpiresAt;
  return member.state === "invited" && until !== null && Date.parse(until) <= nowMs;
}

/** An open invitation has only its address. */
export function nameOf(member: Member): string {
  return member.name ?? member.email;
}

/** What the list and the panel say of a member, in the language and clock of this device. */
export function useMemberWords(nowMs: number) {
  const t = useWords("people");
  const when = useWhen(nowMs);
  return {
    lastSeen: (member: Member) =>
      member.lastSeenAt ? when(member.lastSeenAt) : t("members.never"),
    /** Until when the link works, or that it has ended; null where there is no link. */
    link: (member: Member) => {
      const until = member.invitationExpiresAt;
      if (until === null) return null;
      const key = hasEnded(member, nowMs) ? "expiredOn" : "until";
      return t(`members.${key}`, { when: when(until) });
    },
    state: (member: Member) => t(`members.${hasEnded(member, nowMs) ? "expired" : member.state}`),
  };
}
