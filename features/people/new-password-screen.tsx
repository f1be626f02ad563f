import { useMutation } from "@tanstack/react-query";
import { useState } from "react";

import { resetPassword } from "@shared/contracts/people";
import { call, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Form, TextLink } from "@features/ui";

import { EntryFrame } from "./entry-frame";
import { useLinkSecret } from "./link-secret";
import { NewPasswordFields } from "./new-password-fields";
import { passwordProblem } from "./password-rules";
import { peoplePaths } from "./people-paths";

/** Where the link of a reset letter leads. */
export function NewPasswordScreen() {
  const t = useWords("people");
  const inWords = useErrorWords();
  const secret = useLinkSecret();
  const [password, setPassword] = useState("");
  const [again, setAgain] = useState("");
  const [tried, setTried] = useState(false);
  const reset = useMutation({
    mutationFn: () => call(resetPassword, { body: { secret, newPassword: password } }),
  });
  const submit = () => {
    setTried(true);
    if (passwordProblem(password, again) === null && !reset.isPending) reset.mutate();
  };
  return (
    <EntryFrame title={t("newPassword.title")} heading={t("newPassword.title")}>
      {secret === "" ? (
        <Banner kind="wrong" lead={t("entry.linkBroken")}>
          {t("entry.linkBrokenDetail")}
        </Banner>
      ) : reset.isSuccess ? (
        <>
          <Banner kind="note" live lead={t("newPassword.done")}>
            {t("newPassword.doneDetail")}
          </Banner>
          <Button label={t("signIn.do")} href={peoplePaths.signIn} full />
        </>
      ) : (
        <Form
          label={t("newPassword.title")}
          onSubmit={submit}
          errors={reset.error ? [inWords(reset.error)] : []}
        >
          <NewPasswordFields
            password={password}
            again={again}
            onPassword={setPassword}
            onAgain={setAgain}
            tried={tried}
          />
          <Button submit full label={t("newPassword.do")} busy={reset.isPending} />
        </Form>
      )}
      <TextLink label={t("forgotten.again")} href={peoplePaths.forgottenPassword} />
    </EntryFrame>
  );
}
