import { router } from "expo-router";
import { useState } from "react";

import { acceptInvitation } from "@shared/contracts/people";
import { ApiError, call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Form, TextField, useBreakpoint } from "@features/ui";

import { NewPasswordField } from "./new-password-field";
import { passwordProblem } from "./password-rules";
import { useEnter } from "./use-enter";

/**
 * Name and password of somebody new; only the password of somebody who has an account already, whose
 * name and password stay as they are.
 */
export function AcceptInvitationForm(props: {
  secret: string;
  email: string;
  hasAccount: boolean;
  /** The invitation was used, withdrawn or ran out while this stood open. */
  onGone: () => void;
}) {
  const t = useWords("people");
  const enter = useEnter();
  const { secret, email, hasAccount, onGone } = props;
  const size = useBreakpoint() === "phone" ? "field" : "default";
  const [name, setName] = useState("");
  const [password, setPassword] = useState("");
  const [tried, setTried] = useState(false);
  const accept = useChange({
    send: async () => {
      try {
        // The contract wants a name; the server does not use it where there is an account.
        const body = { secret, name: hasAccount ? email : name.trim(), password };
        return await call(acceptInvitation, { body });
      } catch (error) {
        if (error instanceof ApiError && error.status === 410) onGone();
        throw error;
      }
    },
    onDone: (session) => {
      enter(session);
      router.replace("/");
    },
    fields: ["name", "password"],
  });
  const ready = hasAccount
    ? password !== ""
    : name.trim() !== "" && passwordProblem(password) === null;
  const submit = () => {
    setTried(true);
    if (ready) accept.send(undefined);
  };
  return (
    <Form label={t("invitation.form")} onSubmit={submit} errors={accept.formErrors}>
      {hasAccount ? (
        <>
          <Banner kind="note" lead={t("invitation.hasAccount")}>
            {t("invitation.hasAccountDo")}
          </Banner>
          <TextField
            label={t("field.password")}
            kind="password"
            name="password"
            autoComplete="current-password"
            size={size}
            value={password}
            onChange={setPassword}
            error={
              tried && password === ""
                ? t("field.passwordMissing")
                : accept.fieldError("password") && t("invitation.wrongPassword")
            }
            required
          />
        </>
      ) : (
        <>
          <TextField
            label={t("field.name")}
            name="name"
            autoComplete="name"
            size={size}
            value={name}
            onChange={setName}
            hint={t("field.nameHint")}
            error={tried && name.trim() === "" ? t("field.nameMissing") : accept.fieldError("name")}
            required
          />
          <NewPasswordField
            label={t("field.password")}
            size={size}
            value={password}
            onChange={setPassword}
            tried={tried}
            refused={accept.fieldError("password")}
          />
        </>
      )}
      <Button submit full size={size} label={t("invitation.submit")} busy={accept.busy} />
    </Form>
  );
}
