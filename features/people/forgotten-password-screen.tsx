import { useMutation } from "@tanstack/react-query";
import { useState } from "react";

import { requestPasswordReset } from "@shared/contracts/people";
import { call, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Form, TextField, TextLink } from "@features/ui";

import { EntryFrame } from "./entry-frame";
import { peoplePaths } from "./people-paths";

/** Asks for a reset link; the answer is the same whether the address is known or not. */
export function ForgottenPasswordScreen() {
  const t = useWords("people");
  const inWords = useErrorWords();
  const [email, setEmail] = useState("");
  const [missing, setMissing] = useState(false);
  const request = useMutation({
    mutationFn: () => call(requestPasswordReset, { body: { email: email.trim() } }),
  });
  const submit = () => {
    setMissing(email.trim() === "");
    if (email.trim() !== "" && !request.isPending) request.mutate();
  };
  return (
    <EntryFrame
      title={t("forgotten.title")}
      heading={t("forgotten.title")}
      lead={t("forgotten.lead")}
    >
      {request.isSuccess ? (
        <Banner kind="note" live icon="mail" lead={t("forgotten.sent")}>
          {t("forgotten.sentDetail", { email: email.trim() })}
        </Banner>
      ) : (
        <Form
          label={t("forgotten.title")}
          onSubmit={submit}
          errors={request.error ? [inWords(request.error)] : []}
        >
          <TextField
            label={t("field.email")}
            kind="email"
            autoComplete="username"
            value={email}
            onChange={setEmail}
            error={missing ? t("field.emailNeeded") : null}
            required
          />
          <Button submit full label={t("forgotten.do")} busy={request.isPending} />
        </Form>
      )}
      <TextLink label={t("entry.backToSignIn")} href={peoplePaths.signIn} />
    </EntryFrame>
  );
}
