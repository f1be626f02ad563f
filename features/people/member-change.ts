import { useQueryClient } from "@tanstack/react-query";

import {
  removeMember,
  resendInvitation,
  updateMember,
  type Member,
  type Role,
} from "@shared/contracts/people";
import { call, sessionQuery, useChange, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { useToast } from "@features/ui";

import { nameOf } from "./member-words";
import { peopleQueries } from "./people-queries";

export type MemberChange =
  | { readonly kind: "role"; readonly role: Role }
  | { readonly kind: "state"; readonly state: "active" | "disabled" }
  | { readonly kind: "resend" }
  | { readonly kind: "remove" };

/** A change nobody but another administrator could take back, so it is asked for first. */
export function locksOneselfOut(member: Member, change: MemberChange): boolean {
  if (!member.isSelf) return false;
  if (change.kind === "role") return change.role !== "administrator";
  return change.kind === "state" && change.state === "disabled";
}

/** Sends a change of one member, says that it is done and offers to take it back where that works. */
export function useMemberChange(member: Member, onDone: () => void) {
  const t = useWords("people");
  const inWords = useErrorWords();
  const toast = useToast();
  const client = useQueryClient();
  const params = { memberId: member.id };

  const refresh = async () => {
    await client.invalidateQueries({ queryKey: peopleQueries.members.queryKey });
    // One's own role decides what the whole application offers; one's own removal ends the session.
    if (member.isSelf) await client.invalidateQueries({ queryKey: sessionQuery.queryKey });
  };
  const send = async (change: MemberChange): Promise<void> => {
    if (change.kind === "remove") await call(removeMember, { params });
    else if (change.kind === "resend") await call(resendInvitation, { params });
    else if (change.kind === "role")
      await call(updateMember, { params, body: { role: change.role } });
    else await call(updateMember, { params, body: { state: change.state } });
  };
  const said = (change: MemberChange): string => {
    const who = { name: nameOf(member), email: member.email };
    if (change.kind === "role")
      return t("members.roleChanged", { ...who, role: t(`role.${change.role}`) });
    if (change.kind === "state")
      return t(change.state === "active" ? "members.enabledNow" : "members.disabledNow", who);
    if (change.kind === "resend") return t("members.resent", who);
    return t(member.state === "invited" ? "members.withdrawn" : "members.removed", who);
  };
  const takesBack = (change: MemberChange): MemberChange | null => {
    if (locksOneselfOut(member, change) || member.state === "invited") return null;
    if (change.kind === "role") return { kind: "role", role: member.role };
    return change.kind === "state" ? { kind: "state", state: member.state } : null;
  };
  const undo = (back: MemberChange) => {
    send(back)
      .then(refresh)
      .catch((error: unknown) => toast({ message: inWords(error) }));
  };
  return useChange({
    send,
    onDone: async (_, change) => {
      await refresh();
      const back = takesBack(change);
      toast({ message: said(change), ...(back ? { onUndo: () => undo(back) } : {}) });
      onDone();
    },
  });
}
