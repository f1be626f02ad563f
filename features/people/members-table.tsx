import { useState } from "react";
import { View } from "react-native";

import type { Member } from "@shared/contracts/people";
import { useWords } from "@features/i18n";
import { Button, Card, Chip, Row, Table, Text, useBreakpoint, type Column } from "@features/ui";

import { hasEnded, nameOf, useMemberWords } from "./member-words";

interface MembersTableProps {
  members: readonly Member[];
  onOpen: (member: Member) => void;
}

export function MembersTable({ members, onOpen }: MembersTableProps) {
  const t = useWords("people");
  const [nowMs] = useState(() => Date.now());
  const words = useMemberWords(nowMs);
  const size = useBreakpoint();
  const wide = size === "wide";
  const columns: Column<Member>[] = [
    {
      key: "name",
      header: t("members.name"),
      render: (member) => <Name member={member} withEmail={!wide} />,
    },
    { key: "email", header: t("members.email"), wideOnly: true, render: ({ email }) => email },
    { key: "role", header: t("members.role"), render: (member) => t(`role.${member.role}`) },
    {
      key: "state",
      header: t("members.state"),
      render: (member) => <State member={member} nowMs={nowMs} />,
    },
    { key: "seen", header: t("members.lastSeen"), wideOnly: true, render: words.lastSeen },
    {
      key: "change",
      header: t("members.action"),
      render: (member) => <ChangeButton member={member} onOpen={onOpen} />,
    },
  ];
  const table = (
    <Table
      caption={t("members.title")}
      captionHidden
      columns={columns}
      rows={members}
      rowKey={(member) => member.id}
      twoLines
      card={{
        title: (member) => <Name member={member} />,
        figure: (member) => <StateChip member={member} nowMs={nowMs} />,
        lines: (member) => [
          member.name === null ? null : member.email,
          t(`role.${member.role}`),
          words.link(member) ??
            (member.lastSeenAt
              ? t("members.lastSeenOn", { when: words.lastSeen(member) })
              : t("members.neverSeen")),
          <View key="change" style={{ marginTop: 8 }}>
            <ChangeButton member={member} onOpen={onOpen} />
          </View>,
        ],
      }}
    />
  );
  return size === "phone" ? table : <Card pad={0}>{table}</Card>;
}

/** Where there is no column for it, the address stands under the name. */
function Name({ member, withEmail }: { member: Member; withEmail?: boolean }) {
  const t = useWords("people");
  return (
    <View>
      <Row gap={2} wrap>
        <Text variant="subhead" level="none">
          {nameOf(member)}
        </Text>
        {member.isSelf ? <Chip tone="line" label={t("members.you")} /> : null}
      </Row>
      {withEmail && member.name !== null ? (
        <Text variant="small" tone="ink2">
          {member.email}
        </Text>
      ) : null}
    </View>
  );
}

/** The state, and under it until when an invitation's link works. */
function State({ member, nowMs }: { member: Member; nowMs: number }) {
  const words = useMemberWords(nowMs);
  const link = words.link(member);
  return (
    <View style={{ gap: 2 }}>
      <StateChip member={member} nowMs={nowMs} />
      {link ? (
        <Text variant="small" tone="ink2">
          {link}
        </Text>
      ) : null}
    </View>
  );
}

/** Active is the usual case and stays quiet. */
function StateChip({ member, nowMs }: { member: Member; nowMs: number }) {
  const words = useMemberWords(nowMs);
  const label = words.state(member);
  if (member.state === "active") {
    return (
      <Text variant="table" tone="ink2">
        {label}
      </Text>
    );
  }
  if (member.state === "disabled") return <Chip tone="line" label={label} />;
  if (hasEnded(member, nowMs)) return <Chip tone="look" label={label} />;
  return <Chip icon="mail" label={label} />;
}

function ChangeButton({ member, onOpen }: Pick<MembersTableProps, "onOpen"> & { member: Member }) {
  const t = useWords("people");
  const phone = useBreakpoint() === "phone";
  if (!member.can.edit && !member.can.remove) return null;
  return (
    <Button
      kind="second"
      size={phone ? "default" : "dense"}
      label={t("members.change")}
      said={t("members.changeSaid", { name: nameOf(member) })}
      onPress={() => onOpen(member)}
    />
  );
}
