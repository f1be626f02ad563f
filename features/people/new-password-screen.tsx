import { useState } from "react";

import { resetPassword } from "@shared/contracts/people";
import { ApiError, call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Form, Text, useBreakpoint } from "@features/ui";

import { EntryFrame } from "./entry-frame";
import { NewPasswordField } from "./new-password-field";
import { passwordProblem } from "./password-rules";
import { peoplePaths } from "./people-paths";
import { useLinkSecret } from "./use-link-secret";

/** Where the link of a reset letter leads. */
export function NewPasswordScreen() {
  const t = useWords("people");
  const secret = useLinkSecret();
  return (
    <EntryFrame title={t("newPassword.title")}>
      {secret === "" ? (
        <AskAgain lead={t("newPassword.noSecretTitle")}>{t("newPassword.noSecret")}</AskAgain>
      ) : (
        // Another link opened in this tab starts afresh.
        <NewPasswordForm key={secret} secret={secret} />
      )}
    </EntryFrame>
  );
}

function AskAgain({ lead, children }: { lead: string; children: string }) {
  const t = useWords("people");
  return (
    <>
      <Banner kind="wrong" live lead={lead}>
        {children}
      </Banner>
      <Button full label={t("newPassword.askAgain")} href={peoplePaths.forgottenPassword} />
    </>
  );
}

function NewPasswordForm({ secret }: { secret: string }) {
  const t = useWords("people");
  const size = useBreakpoint() === "phone" ? "field" : "default";
  const [password, setPassword] = useState("");
  const [tried, setTried] = useState(false);
  const reset = useChange({
    send: () => call(resetPassword, { body: { secret, newPassword: password } }),
    fields: ["newPassword"],
  });
  const submit = () => {
    setTried(true);
    if (passwordProblem(password) === null) reset.send(undefined);
  };
  if (reset.error instanceof ApiError && reset.error.status === 410) {
    return <AskAgain lead={t("newPassword.goneTitle")}>{t("newPassword.gone")}</AskAgain>;
  }
  if (reset.done) {
    return (
      <>
        <Banner kind="note" live lead={t("newPassword.doneTitle")}>
          {t("newPassword.done")}
        </Banner>
        <Button full size={size} label={t("newPassword.toSignIn")} href={peoplePaths.signIn} />
      </>
    );
  }
  return (
    <Form label={t("newPassword.form")} onSubmit={submit} errors={reset.formErrors}>
      <NewPasswordField
        label={t("field.newPassword")}
        size={size}
        value={password}
        onChange={setPassword}
        tried={tried}
        refused={reset.fieldError("newPassword")}
      />
      <Button submit full size={size} label={t("newPassword.submit")} busy={reset.busy} />
      <Text variant="small" tone="ink3">
        {t("newPassword.ends")}
      </Text>
    </Form>
  );
}
