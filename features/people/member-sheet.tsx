import { useState } from "react";
import { View } from "react-native";

import type { Member, Role } from "@shared/contracts/people";
import { useWords } from "@features/i18n";
import { Banner, Button, ChoiceTiles, Divider, Sheet, Stack, Text } from "@features/ui";

import { locksOneselfOut, useMemberChange, type MemberChange } from "./member-change";
import { MemberDialog } from "./member-dialog";
import { nameOf, useMemberWords } from "./member-words";
import { useRoleChoices } from "./role-choices";

/** One member: role, a fresh invitation, disable or enable, removal. */
export function MemberSheet({ member, onClose }: { member: Member; onClose: () => void }) {
  const t = useWords("people");
  const choices = useRoleChoices();
  const [nowMs] = useState(() => Date.now());
  const words = useMemberWords(nowMs);
  const [role, setRole] = useState<Role>(member.role);
  const [asking, setAsking] = useState<MemberChange | null>(null);
  const change = useMemberChange(member, onClose);
  const invited = member.state === "invited";
  const start = (next: MemberChange) => {
    change.reset();
    if (next.kind === "remove" || locksOneselfOut(member, next)) setAsking(next);
    else change.send(next);
  };
  const refused = change.formErrors.join(" ");
  return (
    <Sheet open kind="side" title={nameOf(member)} onClose={onClose}>
      <View style={{ gap: 16 }}>
        <View>
          {invited ? null : <Text tone="ink2">{member.email}</Text>}
          <Text variant="small" tone="ink2">
            {words.link(member) ?? words.state(member)}
          </Text>
        </View>
        {refused && asking === null ? (
          <Banner kind="wrong" live>
            {refused}
          </Banner>
        ) : null}
        {invited ? (
          <Action
            label={t("members.resend")}
            detail={t("members.resendDetail")}
            busy={change.busy}
            onPress={() => start({ kind: "resend" })}
          />
        ) : null}
        {member.can.edit ? (
          <>
            <ChoiceTiles
              label={t("members.role")}
              value={role}
              choices={choices}
              onChange={setRole}
            />
            {role === member.role ? null : (
              <Button
                full
                label={t("members.changeRole", { role: t(`role.${role}`) })}
                busy={change.busy}
                onPress={() => start({ kind: "role", role })}
              />
            )}
          </>
        ) : null}
        <Divider />
        {member.can.edit && member.state === "active" ? (
          <Action
            label={t("members.disable")}
            detail={t("members.disableDetail")}
            busy={change.busy}
            onPress={() => start({ kind: "state", state: "disabled" })}
          />
        ) : null}
        {member.can.edit && member.state === "disabled" ? (
          <Action
            label={t("members.enable")}
            detail={t("members.enableDetail")}
            busy={change.busy}
            onPress={() => start({ kind: "state", state: "active" })}
          />
        ) : null}
        {member.can.remove ? (
          <Button
            kind="quiet"
            full
            label={t(invited ? "members.withdraw" : "members.remove")}
            onPress={() => start({ kind: "remove" })}
          />
        ) : null}
      </View>
      {asking ? (
        <MemberDialog
          member={member}
          change={asking}
          busy={change.busy}
          refused={refused}
          onConfirm={() => change.send(asking)}
          onClose={() => setAsking(null)}
        />
      ) : null}
    </Sheet>
  );
}

function Action(props: { label: string; detail: string; busy: boolean; onPress: () => void }) {
  return (
    <Stack gap={1}>
      <Button kind="second" full label={props.label} busy={props.busy} onPress={props.onPress} />
      <Text variant="small" tone="ink2">
        {props.detail}
      </Text>
    </Stack>
  );
}
