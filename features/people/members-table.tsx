import { View } from "react-native";

import type { Member } from "@shared/contracts/people";
import { useFormat, useWords } from "@features/i18n";
import { Button, Card, Chip, Table, Text, useBreakpoint, type Column } from "@features/ui";

interface MembersTableProps {
  members: readonly Member[];
  onOpen: (member: Member) => void;
}

export function MembersTable({ members, onOpen }: MembersTableProps) {
  const t = useWords("people");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const seen = (member: Member) =>
    member.lastSeenAt ? format.dateTime(Date.parse(member.lastSeenAt)) : t("members.never");
  const columns: Column<Member>[] = [
    { key: "name", header: t("field.name"), render: (member) => nameOf(member) },
    { key: "email", header: t("field.email"), render: (member) => member.email },
    { key: "role", header: t("field.role"), render: (member) => t(`role.${member.role}`) },
    { key: "state", header: t("members.state"), render: (member) => <StateChip member={member} /> },
    { key: "seen", header: t("members.lastSeen"), wideOnly: true, render: seen },
    {
      key: "edit",
      header: t("members.change"),
      render: (member) => <ChangeButton member={member} onOpen={onOpen} />,
    },
  ];
  const nameOf = (member: Member) => {
    const name = member.name ?? member.email;
    return member.isSelf ? t("members.you", { name }) : name;
  };
  const table = (
    <Table
      caption={t("members.title")}
      captionHidden
      columns={columns}
      rows={members}
      rowKey={(member) => member.id}
      card={{
        title: nameOf,
        figure: (member) => <StateChip member={member} />,
        lines: (member) => [
          member.email,
          t(`role.${member.role}`),
          t("members.seen", { when: seen(member) }),
          <View key="change" style={{ marginTop: 8 }}>
            <ChangeButton member={member} onOpen={onOpen} />
          </View>,
        ],
      }}
      empty={<Text>{t("members.none")}</Text>}
    />
  );
  return phone ? table : <Card pad={0}>{table}</Card>;
}

function StateChip({ member }: { member: Member }) {
  const t = useWords("people");
  const format = useFormat();
  if (member.state === "active") return <Text variant="table">{t("members.active")}</Text>;
  if (member.state === "disabled") return <Chip tone="line" label={t("members.disabled")} />;
  const until = member.invitationExpiresAt;
  return (
    <Chip
      tone="plain"
      icon="mail"
      label={
        until
          ? t("members.invitedUntil", { date: format.date(Date.parse(until)) })
          : t("members.invited")
      }
    />
  );
}

function ChangeButton({ member, onOpen }: Pick<MembersTableProps, "onOpen"> & { member: Member }) {
  const t = useWords("people");
  if (!member.can.edit && !member.can.remove) return null;
  return (
    <Button
      kind="second"
      size="dense"
      label={t("members.change")}
      said={t("members.changeSaid", { name: member.name ?? member.email })}
      onPress={() => onOpen(member)}
    />
  );
}
