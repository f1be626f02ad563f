import { useMutation, useQueryClient } from "@tanstack/react-query";
import { Redirect, useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";

import { signIn } from "@shared/contracts/people";
import { call, sessionQuery, useErrorWords, useSession } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, Form, Text, TextField, useBreakpoint } from "@features/ui";

import { EntryFrame } from "./entry-frame";
import { peoplePaths } from "./people-paths";
import { safeNext } from "./safe-next";

export function SignInScreen() {
  const t = useWords("people");
  const client = useQueryClient();
  const inWords = useErrorWords();
  const session = useSession();
  const { next } = useLocalSearchParams<{ next?: string }>();
  const size = useBreakpoint() === "phone" ? "field" : "default";
  const [email, setEmail] = useState("");
  const [password, setPassword] = useState("");
  const [missing, setMissing] = useState(false);
  const attempt = useMutation({
    mutationFn: () => call(signIn, { body: { email: email.trim(), password } }),
    onSuccess: (answer) => client.setQueryData(sessionQuery.queryKey, answer),
  });

  if (session.data) return <Redirect href={safeNext(next)} />;
  const submit = () => {
    const incomplete = email.trim() === "" || password === "";
    setMissing(incomplete);
    if (!incomplete && !attempt.isPending) attempt.mutate();
  };
  return (
    <EntryFrame title={t("signIn.title")}>
      <Form
        label={t("signIn.title")}
        onSubmit={submit}
        errors={attempt.error ? [inWords(attempt.error)] : []}
      >
        <TextField
          label={t("field.email")}
          kind="email"
          name="email"
          autoComplete="username"
          size={size}
          value={email}
          onChange={setEmail}
          error={missing && email.trim() === "" ? t("field.emailNeeded") : null}
          required
        />
        <TextField
          label={t("field.password")}
          kind="password"
          name="password"
          autoComplete="current-password"
          size={size}
          value={password}
          onChange={setPassword}
          error={missing && password === "" ? t("field.passwordNeeded") : null}
          required
        />
        <View style={{ gap: 12, marginTop: 4 }}>
          <Button submit full size={size} label={t("signIn.do")} busy={attempt.isPending} />
          <Button
            kind="second"
            full
            size={size}
            label={t("signIn.forgotten")}
            href={peoplePaths.forgottenPassword}
          />
        </View>
        <Text variant="small" tone="ink3">
          {t("signIn.trouble")}
        </Text>
      </Form>
    </EntryFrame>
  );
}
