import { useState } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";
import { Button, Card, Chip, Table, useBreakpoint, type Column } from "@features/ui";

import type { AccessToken } from "./revoke-token-dialog";
import { useWhen } from "./use-when";

interface AccessTokensTableProps {
  tokens: readonly AccessToken[];
  onRevoke: (token: AccessToken) => void;
}

export function AccessTokensTable({ tokens, onRevoke }: AccessTokensTableProps) {
  const t = useWords("people");
  const phone = useBreakpoint() === "phone";
  const [nowMs] = useState(() => Date.now());
  const when = useWhen(nowMs);
  const ended = ({ expiresAt }: AccessToken) =>
    expiresAt !== null && Date.parse(expiresAt) <= nowMs;
  const revoke = (token: AccessToken) => (
    <Button
      kind="second"
      size={phone ? "default" : "dense"}
      label={t("tokens.revoke")}
      said={t("tokens.revokeSaid", { name: token.name })}
      onPress={() => onRevoke(token)}
    />
  );
  const expires = (token: AccessToken) => {
    if (token.expiresAt === null) return t("tokens.noExpiry");
    if (!ended(token)) return when(token.expiresAt);
    return <Chip tone="look" label={t("tokens.expired", { when: when(token.expiresAt) })} />;
  };
  const columns: Column<AccessToken>[] = [
    { key: "name", header: t("tokens.name"), render: (token) => token.name },
    { key: "made", header: t("tokens.created"), render: (token) => when(token.createdAt) },
    { key: "ends", header: t("tokens.expires"), render: expires },
    {
      key: "used",
      header: t("tokens.lastUsed"),
      render: (token) => (token.lastUsedAt ? when(token.lastUsedAt) : t("tokens.unused")),
    },
    { key: "revoke", header: t("tokens.action"), render: revoke },
  ];
  const table = (
    <Table
      caption={t("tokens.title")}
      captionHidden
      columns={columns}
      rows={tokens}
      rowKey={(token) => token.id}
      twoLines
      card={{
        title: (token) => token.name,
        lines: (token) => [
          t("tokens.lineCreated", { when: when(token.createdAt) }),
          token.expiresAt === null || ended(token)
            ? expires(token)
            : t("tokens.lineExpires", { when: when(token.expiresAt) }),
          token.lastUsedAt
            ? t("tokens.lineUsed", { when: when(token.lastUsedAt) })
            : t("tokens.lineUnused"),
          <View key="revoke" style={{ marginTop: 8 }}>
            {revoke(token)}
          </View>,
        ],
      }}
    />
  );
  return phone ? table : <Card pad={0}>{table}</Card>;
}
