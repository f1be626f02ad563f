import { Redirect, useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";

import { signIn } from "@shared/contracts/people";
import { ApiError, call, NoAnswer, useChange, useOfflineSince, useSession } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Form, Text, TextField, useBreakpoint } from "@features/ui";

import { askedPage } from "./asked-page";
import { emailProblem } from "./email-problem";
import { EntryFrame } from "./entry-frame";
import { peoplePaths } from "./people-paths";
import { useEnter } from "./use-enter";

/** Sign-in; leads on to the page that was asked for. */
export function SignInScreen() {
  const t = useWords("people");
  const session = useSession();
  const { then } = useLocalSearchParams<{ then?: string }>();
  if (session.data) return <Redirect href={askedPage(then)} />;
  return (
    <EntryFrame title={t("signIn.title")} isFront>
      <SignInForm serverDown={session.data === undefined && isDown(session.error)} />
    </EntryFrame>
  );
}

/** Silence, or the server's own failure: nobody could sign in now. */
function isDown(error: Error | null): boolean {
  return error instanceof NoAnswer || (error instanceof ApiError && error.status >= 500);
}

function SignInForm({ serverDown }: { serverDown: boolean }) {
  const t = useWords("people");
  const enter = useEnter();
  const offline = useOfflineSince() !== null;
  const phone = useBreakpoint() === "phone";
  const size = phone ? "field" : "default";
  const [email, setEmail] = useState("");
  const [password, setPassword] = useState("");
  const [tried, setTried] = useState(false);
  const attempt = useChange({
    send: () => call(signIn, { body: { email: email.trim(), password } }),
    onDone: enter,
  });
  const wrongEmail = emailProblem(email);
  const submit = () => {
    setTried(true);
    if (wrongEmail === null && password !== "") attempt.send(undefined);
  };
  const silent = attempt.error instanceof NoAnswer;
  return (
    <Form label={t("signIn.form")} onSubmit={submit} errors={silent ? [] : attempt.formErrors}>
      {offline ? (
        <Banner kind="note" icon="offline" live>
          {t("signIn.offline")}
        </Banner>
      ) : silent || (serverDown && attempt.error === null) ? (
        <Banner kind="wrong" live lead={t("signIn.serverDown")}>
          {t("signIn.serverDownDo")}
        </Banner>
      ) : null}
      <TextField
        label={t("field.email")}
        kind="email"
        name="email"
        autoComplete="username"
        // On a phone the keyboard would cover the page before anybody has seen it.
        autoFocus={!phone}
        size={size}
        value={email}
        onChange={setEmail}
        error={tried && wrongEmail ? t(`field.${wrongEmail}`) : null}
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
        error={tried && password === "" ? t("field.passwordMissing") : null}
        required
      />
      <View style={{ gap: 12, marginTop: 4 }}>
        <Button submit full size={size} label={t("signIn.submit")} busy={attempt.busy} />
        <Button
          kind="second"
          full
          size={size}
          label={t("signIn.forgotten")}
          href={peoplePaths.forgottenPassword}
        />
      </View>
      <Text variant="small" tone="ink3">
        {t("signIn.noAccount")}
      </Text>
    </Form>
  );
}
