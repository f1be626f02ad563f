import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { View } from "react-native";

import { revokeAccessToken } from "@shared/contracts/people";
import { call, useErrorWords } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  Dialog,
  EmptyState,
  Screen,
  Table,
  useBreakpoint,
  useToast,
  type Column,
} from "@features/ui";

import { Answer } from "./answer";
import { peoplePaths } from "./people-paths";
import { tokensQuery } from "./people-queries";
import { TokenSheet } from "./token-sheet";

type Token = Awaited<ReturnType<NonNullable<typeof tokensQuery.queryFn>>>[number];

/** Bearer tokens for scripts. A secret is shown once, when it is made. */
export function TokensScreen() {
  const t = useWords("people");
  const tokens = useQuery(tokensQuery);
  const [making, setMaking] = useState(false);
  const make = <Button icon="plus" label={t("tokens.make")} onPress={() => setMaking(true)} />;
  return (
    <Screen
      title={t("tokens.title")}
      subtitle={t("tokens.lead")}
      crumbs={[{ label: t("settings.title"), href: peoplePaths.settings }]}
      actions={make}
    >
      <Answer of={tokens}>
        {(rows) =>
          rows.length === 0 ? (
            <EmptyState title={t("tokens.none")} detail={t("tokens.noneDetail")} />
          ) : (
            <TokensTable tokens={rows} />
          )
        }
      </Answer>
      {making ? <TokenSheet onClose={() => setMaking(false)} /> : null}
    </Screen>
  );
}

function TokensTable({ tokens }: { tokens: readonly Token[] }) {
  const t = useWords("people");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const [going, setGoing] = useState<Token | null>(null);
  const day = (at: string | null, none: string) => (at ? format.date(Date.parse(at)) : none);
  const revoke = (token: Token) => (
    <Button
      kind="second"
      size="dense"
      label={t("tokens.revoke")}
      said={t("tokens.revokeSaid", { name: token.name })}
      onPress={() => setGoing(token)}
    />
  );
  const columns: Column<Token>[] = [
    { key: "name", header: t("field.tokenName"), render: (token) => token.name },
    { key: "made", header: t("tokens.made"), render: (token) => day(token.createdAt, "") },
    {
      key: "ends",
      header: t("tokens.ends"),
      render: (token) => day(token.expiresAt, t("tokens.never")),
    },
    {
      key: "used",
      header: t("tokens.used"),
      render: (token) => day(token.lastUsedAt, t("tokens.notYet")),
    },
    { key: "revoke", header: t("tokens.revoke"), render: revoke },
  ];
  const table = (
    <Table
      caption={t("tokens.title")}
      captionHidden
      columns={columns}
      rows={tokens}
      rowKey={(token) => token.id}
      card={{
        title: (token) => token.name,
        lines: (token) => [
          `${t("tokens.ends")}: ${day(token.expiresAt, t("tokens.never"))}`,
          `${t("tokens.used")}: ${day(token.lastUsedAt, t("tokens.notYet"))}`,
          <View key="revoke" style={{ marginTop: 8 }}>
            {revoke(token)}
          </View>,
        ],
      }}
    />
  );
  return (
    <>
      {phone ? table : <Card pad={0}>{table}</Card>}
      {going ? <RevokeDialog token={going} onClose={() => setGoing(null)} /> : null}
    </>
  );
}

function RevokeDialog({ token, onClose }: { token: Token; onClose: () => void }) {
  const t = useWords("people");
  const toast = useToast();
  const client = useQueryClient();
  const inWords = useErrorWords();
  const revoke = useMutation({
    mutationFn: () => call(revokeAccessToken, { params: { tokenId: token.id } }),
    onSuccess: async () => {
      await client.invalidateQueries(tokensQuery);
      toast({ message: t("tokens.revoked", { name: token.name }) });
      onClose();
    },
  });
  return (
    <Dialog
      open
      stop
      title={t("tokens.revokeTitle", { name: token.name })}
      confirmLabel={t("tokens.revoke")}
      busy={revoke.isPending}
      onConfirm={() => revoke.mutate()}
      onClose={onClose}
    >
      {revoke.error ? (
        <Banner kind="wrong">{inWords(revoke.error)}</Banner>
      ) : (
        t("tokens.revokeDetail")
      )}
    </Dialog>
  );
}
