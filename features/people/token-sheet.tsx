import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { View } from "react-native";

import { createAccessToken } from "@shared/contracts/people";
import { call, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  ChoiceTiles,
  Form,
  Sheet,
  Text,
  TextField,
  useToast,
} from "@features/ui";

import { tokensQuery } from "./people-queries";

const lifetimes = ["30", "90", "365", "never"] as const;
type Lifetime = (typeof lifetimes)[number];

/** Makes a token, then shows its secret: the only time it can be read. */
export function TokenSheet({ onClose }: { onClose: () => void }) {
  const t = useWords("people");
  const client = useQueryClient();
  const inWords = useErrorWords();
  const [name, setName] = useState("");
  const [lifetime, setLifetime] = useState<Lifetime>("90");
  const [tried, setTried] = useState(false);
  const make = useMutation({
    mutationFn: () =>
      call(createAccessToken, {
        body: { name: name.trim(), expiresInDays: lifetime === "never" ? null : Number(lifetime) },
      }),
    onSuccess: () => client.invalidateQueries(tokensQuery),
  });
  const submit = () => {
    setTried(true);
    if (name.trim() !== "" && !make.isPending) make.mutate();
  };
  return (
    <Sheet open kind="side" title={t("tokens.make")} onClose={onClose}>
      {make.data ? (
        <Secret secret={make.data.secret} onClose={onClose} />
      ) : (
        <Form
          label={t("tokens.make")}
          onSubmit={submit}
          errors={make.error ? [inWords(make.error)] : []}
        >
          <TextField
            label={t("field.tokenName")}
            autoFocus
            value={name}
            onChange={setName}
            hint={t("tokens.nameHint")}
            error={tried && name.trim() === "" ? t("field.nameNeeded") : null}
            required
          />
          <ChoiceTiles
            label={t("tokens.lifetime")}
            value={lifetime}
            choices={lifetimes.map((value) => ({ value, label: t(`tokens.days.${value}`) }))}
            onChange={setLifetime}
          />
          <Button submit full label={t("tokens.make")} busy={make.isPending} />
        </Form>
      )}
    </Sheet>
  );
}

function Secret({ secret, onClose }: { secret: string; onClose: () => void }) {
  const t = useWords("people");
  const toast = useToast();
  const copy = async () => {
    await navigator.clipboard.writeText(secret);
    toast({ message: t("tokens.copied") });
  };
  return (
    <View style={{ gap: 16 }}>
      <Banner kind="look" live lead={t("tokens.once")}>
        {t("tokens.onceDetail")}
      </Banner>
      <Card>
        <Text variant="asReadS">{secret}</Text>
      </Card>
      {navigator.clipboard ? (
        <Button full label={t("tokens.copy")} onPress={() => void copy()} />
      ) : null}
      <Button kind="second" full label={t("tokens.keptIt")} onPress={onClose} />
    </View>
  );
}
