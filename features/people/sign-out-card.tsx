import { useState } from "react";

import type { Session } from "@shared/contracts/people";
import { useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Card, Dialog, Row, Text } from "@features/ui";

import { useSignOut } from "./use-sign-out";

export function SignOutCard({ session }: { session: Session }) {
  const t = useWords("people");
  const inWords = useErrorWords();
  const [asking, setAsking] = useState(false);
  const leave = useSignOut();
  return (
    <Card pad={5} label={t("signOut.title")}>
      <Text variant="heading">{t("signOut.title")}</Text>
      <Text tone="ink2" style={{ marginBottom: 14 }}>
        {t("signOut.who", { name: session.account.name, organisation: session.organisation.name })}
      </Text>
      {leave.error ? <Banner kind="wrong">{inWords(leave.error)}</Banner> : null}
      <Row gap={3} wrap>
        <Button
          kind="second"
          icon="signOut"
          label={t("signOut.here")}
          busy={leave.isPending}
          onPress={() => leave.mutate("here")}
        />
        <Button kind="quiet" label={t("signOut.everywhere")} onPress={() => setAsking(true)} />
      </Row>
      <Dialog
        open={asking}
        title={t("signOut.everywhereTitle")}
        confirmLabel={t("signOut.everywhere")}
        busy={leave.isPending}
        onConfirm={() => leave.mutate("everywhere")}
        onClose={() => setAsking(false)}
      >
        {t("signOut.everywhereDetail")}
      </Dialog>
    </Card>
  );
}
