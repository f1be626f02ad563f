import { useState } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";
import { Banner, Button, Card, Dialog, Row, Text } from "@features/ui";

import { useSignOut } from "./use-sign-out";

export function SignOutCard({ keepsTokens }: { keepsTokens: boolean }) {
  const t = useWords("people");
  const [asking, setAsking] = useState(false);
  const leave = useSignOut();
  const error = leave.formErrors.join(" ");
  return (
    <Card pad={5} label={t("settings.leaveTitle")}>
      <Text variant="heading">{t("settings.leaveTitle")}</Text>
      <Text tone="ink2" style={{ marginBottom: 14 }}>
        {t("settings.leaveDetail")}
      </Text>
      {error && !asking ? (
        <View style={{ marginBottom: 14 }}>
          <Banner kind="wrong" live>
            {error}
          </Banner>
        </View>
      ) : null}
      <Row gap={3} wrap>
        <Button
          kind="second"
          icon="signOut"
          label={t("settings.signOut")}
          busy={leave.busy}
          onPress={() => leave.send("here")}
        />
        <Button kind="quiet" label={t("settings.everywhere")} onPress={() => setAsking(true)} />
      </Row>
      <Dialog
        open={asking}
        title={t("settings.everywhereTitle")}
        confirmLabel={t("settings.everywhere")}
        busy={leave.busy}
        onConfirm={() => leave.send("everywhere")}
        onClose={() => setAsking(false)}
      >
        <Text tone="ink2">
          {t("settings.everywhereDetail")}
          {keepsTokens ? ` ${t("settings.everywhereTokens")}` : null}
        </Text>
        {error ? (
          <Banner kind="wrong" live>
            {error}
          </Banner>
        ) : null}
      </Dialog>
    </Card>
  );
}
