import { router } from "expo-router";
import { useState } from "react";

import { changePassword } from "@shared/contracts/people";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, Card, Form, Row, Screen, Text, TextField, useToast } from "@features/ui";

import { NewPasswordField } from "./new-password-field";
import { passwordProblem } from "./password-rules";
import { peoplePaths } from "./people-paths";

/** A new own password, proven with the current one; other browsers are signed out. */
export function ChangePasswordScreen() {
  const t = useWords("people");
  const toast = useToast();
  const [currentPassword, setCurrent] = useState("");
  const [password, setPassword] = useState("");
  const [tried, setTried] = useState(false);
  const change = useChange({
    send: () => call(changePassword, { body: { currentPassword, newPassword: password } }),
    onDone: () => {
      toast({ message: t("password.changed") });
      router.replace(peoplePaths.settings);
    },
    fields: ["currentPassword", "newPassword"],
  });
  const submit = () => {
    setTried(true);
    if (currentPassword !== "" && passwordProblem(password) === null) change.send(undefined);
  };
  return (
    <Screen
      title={t("password.title")}
      crumbs={[{ label: t("settings.title"), href: peoplePaths.settings }]}
      narrow
    >
      <Card pad={5}>
        <Form label={t("password.form")} onSubmit={submit} errors={change.formErrors}>
          <TextField
            label={t("field.currentPassword")}
            kind="password"
            name="current-password"
            autoComplete="current-password"
            value={currentPassword}
            onChange={setCurrent}
            error={
              tried && currentPassword === ""
                ? t("field.passwordMissing")
                : change.fieldError("currentPassword")
            }
            required
          />
          <NewPasswordField
            label={t("field.newPassword")}
            value={password}
            onChange={setPassword}
            tried={tried}
            refused={change.fieldError("newPassword")}
          />
          <Text variant="small" tone="ink2">
            {t("password.ends")}
          </Text>
          <Row gap={3} wrap>
            <Button submit label={t("password.submit")} busy={change.busy} />
            <Button kind="quiet" label={t("password.cancel")} href={peoplePaths.settings} />
          </Row>
        </Form>
      </Card>
    </Screen>
  );
}
