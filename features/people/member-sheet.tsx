import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { View } from "react-native";

import {
  removeMember,
  resendInvitation,
  updateMember,
  type Member,
  type Role,
} from "@shared/contracts/people";
import { call, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, ChoiceTiles, Dialog, Sheet, Text, useToast } from "@features/ui";

import { membersQuery } from "./people-queries";
import { useRoleChoices } from "./role-choices";

type Change =
  | { readonly kind: "role"; readonly role: Role }
  | { readonly kind: "state"; readonly state: "active" | "disabled" }
  | { readonly kind: "resend" }
  | { readonly kind: "remove" };

/** One member: role, disable or enable, a fresh invitation, removal. */
export function MemberSheet({ member, onClose }: { member: Member; onClose: () => void }) {
  const t = useWords("people");
  const inWords = useErrorWords();
  const choices = useRoleChoices();
  const [role, setRole] = useState<Role>(member.role);
  const [removing, setRemoving] = useState(false);
  const change = useMemberChange(member, onClose);
  const name = member.name ?? member.email;
  const invited = member.state === "invited";
  return (
    <Sheet open kind="side" title={name} onClose={onClose}>
      <View style={{ gap: 16 }}>
        {change.error ? (
          <Banner kind="wrong" live>
            {inWords(change.error)}
          </Banner>
        ) : null}
        <Text tone="ink2">{member.email}</Text>
        {member.can.edit ? (
          <>
            <ChoiceTiles
              label={t("field.role")}
              value={role}
              choices={choices}
              onChange={setRole}
            />
            <Button
              full
              label={t("members.saveRole")}
              busy={change.isPending}
              {...(role === member.role ? { offBecause: t("members.roleUnchanged") } : {})}
              onPress={() => change.mutate({ kind: "role", role })}
            />
          </>
        ) : null}
        {invited ? (
          <Button
            kind="second"
            full
            label={t("members.resend")}
            busy={change.isPending}
            onPress={() => change.mutate({ kind: "resend" })}
          />
        ) : null}
        {member.can.edit && !invited ? (
          <Button
            kind="second"
            full
            label={t(member.state === "active" ? "members.disable" : "members.enable")}
            busy={change.isPending}
            onPress={() =>
              change.mutate({
                kind: "state",
                state: member.state === "active" ? "disabled" : "active",
              })
            }
          />
        ) : null}
        {member.can.remove ? (
          <Button
            kind="quiet"
            full
            label={t(invited ? "members.withdraw" : "members.remove")}
            onPress={() => setRemoving(true)}
          />
        ) : null}
      </View>
      <Dialog
        open={removing}
        stop
        title={t(invited ? "members.withdrawTitle" : "members.removeTitle", { name })}
        confirmLabel={t(invited ? "members.withdraw" : "members.remove")}
        busy={change.isPending}
        onConfirm={() => change.mutate({ kind: "remove" }, { onSettled: () => setRemoving(false) })}
        onClose={() => setRemoving(false)}
      >
        {t(invited ? "members.withdrawDetail" : "members.removeDetail")}
      </Dialog>
    </Sheet>
  );
}

function useMemberChange(member: Member, onDone: () => void) {
  const t = useWords("people");
  const toast = useToast();
  const client = useQueryClient();
  const params = { memberId: member.id };
  return useMutation({
    mutationFn: async (change: Change): Promise<void> => {
      switch (change.kind) {
        case "role":
          await call(updateMember, { params, body: { role: change.role } });
          return;
        case "state":
          await call(updateMember, { params, body: { state: change.state } });
          return;
        case "resend":
          await call(resendInvitation, { params });
          return;
        case "remove":
          await call(removeMember, { params });
      }
    },
    onSuccess: async (_, change) => {
      await client.invalidateQueries(membersQuery);
      toast({ message: t(`members.done.${change.kind}`, { name: member.name ?? member.email }) });
      onDone();
    },
  });
}
