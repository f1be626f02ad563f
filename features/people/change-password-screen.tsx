import { useMutation } from "@tanstack/react-query";
import { router } from "expo-router";
import { useState } from "react";

import { changePassword } from "@shared/contracts/people";
import { call, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, Card, Form, Row, Screen, TextField, useToast } from "@features/ui";

import { NewPasswordFields } from "./new-password-fields";
import { passwordProblem } from "./password-rules";
import { peoplePaths } from "./people-paths";

export function ChangePasswordScreen() {
  const t = useWords("people");
  const toast = useToast();
  const inWords = useErrorWords();
  const [currentPassword, setCurrent] = useState("");
  const [password, setPassword] = useState("");
  const [again, setAgain] = useState("");
  const [tried, setTried] = useState(false);
  const change = useMutation({
    mutationFn: () => call(changePassword, { body: { currentPassword, newPassword: password } }),
    onSuccess: () => {
      toast({ message: t("password.changed") });
      router.replace(peoplePaths.settings);
    },
  });
  const submit = () => {
    setTried(true);
    const ready = currentPassword !== "" && passwordProblem(password, again) === null;
    if (ready && !change.isPending) change.mutate();
  };
  return (
    <Screen
      title={t("password.title")}
      crumbs={[{ label: t("settings.title"), href: peoplePaths.settings }]}
      narrow
    >
      <Card pad={5}>
        <Form
          label={t("password.title")}
          onSubmit={submit}
          errors={change.error ? [inWords(change.error)] : []}
        >
          <TextField
            label={t("field.currentPassword")}
            kind="password"
            autoComplete="current-password"
            value={currentPassword}
            onChange={setCurrent}
            error={tried && currentPassword === "" ? t("field.passwordNeeded") : null}
            required
          />
          <NewPasswordFields
            password={password}
            again={again}
            onPassword={setPassword}
            onAgain={setAgain}
            tried={tried}
          />
          <Row gap={3} wrap>
            <Button submit label={t("password.do")} busy={change.isPending} />
            <Button kind="quiet" label={t("cancel")} href={peoplePaths.settings} />
          </Row>
        </Form>
      </Card>
    </Screen>
  );
}
