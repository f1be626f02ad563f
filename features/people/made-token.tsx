import { useState } from "react";
import { View } from "react-native";
import type { z } from "zod";

import type { createAccessToken } from "@shared/contracts/people";
import { useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  radius,
  Row,
  space,
  Text,
  useTheme,
  useToast,
  webStyle,
} from "@features/ui";

import { copyText } from "./copy-text";

export type NewToken = z.infer<(typeof createAccessToken)["answer"]>;

/** The secret of a new token, shown this once. It stands until somebody says they have kept it. */
export function MadeToken({ token, onKept }: { token: NewToken; onKept: () => void }) {
  const t = useWords("people");
  const toast = useToast();
  const { colour } = useTheme();
  const [copyFailed, setCopyFailed] = useState(false);
  const copy = async () => {
    const copied = await copyText(token.secret);
    setCopyFailed(!copied);
    if (copied) toast({ message: t("tokens.copied") });
  };
  const title = t("tokens.madeTitle", { name: token.name });
  return (
    <Card pad={5} label={title}>
      <View style={{ gap: 14 }}>
        <Text variant="heading">{title}</Text>
        <Banner kind="look" live lead={t("tokens.madeLead")}>
          {t("tokens.madeDetail")}
        </Banner>
        <View
          role="group"
          aria-label={t("tokens.secret")}
          style={{ backgroundColor: colour.well, borderRadius: radius.field, padding: space[3] }}
        >
          <Text variant="asReadM" style={webStyle({ overflowWrap: "anywhere" })}>
            {token.secret}
          </Text>
        </View>
        <Text variant="small" tone="ink2">
          {t("tokens.use")}
        </Text>
        {copyFailed ? (
          <Banner kind="wrong" live>
            {t("tokens.copyFailed")}
          </Banner>
        ) : null}
        <Row gap={3} wrap>
          <Button label={t("tokens.copy")} onPress={() => void copy()} />
          <Button kind="second" label={t("tokens.kept")} onPress={onKept} />
        </Row>
      </View>
    </Card>
  );
}
