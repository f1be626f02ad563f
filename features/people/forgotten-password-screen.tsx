import { useState } from "react";

import { requestPasswordReset } from "@shared/contracts/people";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Form, TextField, TextLink, useBreakpoint } from "@features/ui";

import { emailProblem } from "./email-problem";
import { EntryFrame } from "./entry-frame";
import { peoplePaths } from "./people-paths";

/** Asks for a reset link; the answer is the same whether the address is known or not. */
export function ForgottenPasswordScreen() {
  const t = useWords("people");
  const size = useBreakpoint() === "phone" ? "field" : "default";
  const [email, setEmail] = useState("");
  const [tried, setTried] = useState(false);
  const request = useChange({
    send: () => call(requestPasswordReset, { body: { email: email.trim() } }),
  });
  const problem = emailProblem(email);
  const submit = () => {
    setTried(true);
    if (problem === null) request.send(undefined);
  };
  const back = <TextLink label={t("forgotten.back")} href={peoplePaths.signIn} />;
  if (request.done) {
    return (
      <EntryFrame title={t("forgotten.sentTitle")}>
        <Banner kind="note" live icon="mail">
          {t("forgotten.sent", { email: email.trim() })}
        </Banner>
        <Banner kind="note">{t("forgotten.sentNothing")}</Banner>
        <Button
          kind="second"
          full
          size={size}
          label={t("forgotten.again")}
          onPress={request.reset}
        />
        {back}
      </EntryFrame>
    );
  }
  return (
    <EntryFrame title={t("forgotten.title")} lead={t("forgotten.lead")}>
      <Form label={t("forgotten.form")} onSubmit={submit} errors={request.formErrors}>
        <TextField
          label={t("field.email")}
          kind="email"
          name="email"
          autoComplete="username"
          size={size}
          value={email}
          onChange={setEmail}
          error={tried && problem ? t(`field.${problem}`) : null}
          required
        />
        <Button submit full size={size} label={t("forgotten.submit")} busy={request.busy} />
      </Form>
      {back}
    </EntryFrame>
  );
}
