import { useWords } from "@features/i18n";
import { TextField } from "@features/ui";

import { passwordProblem } from "./password-rules";

/** A new password, twice. Problems show once somebody has tried to send them. */
export function NewPasswordFields(props: {
  password: string;
  again: string;
  onPassword: (text: string) => void;
  onAgain: (text: string) => void;
  tried: boolean;
}) {
  const t = useWords("people");
  const problem = props.tried ? passwordProblem(props.password, props.again) : null;
  return (
    <>
      <TextField
        label={t("field.newPassword")}
        kind="password"
        autoComplete="new-password"
        value={props.password}
        onChange={props.onPassword}
        hint={t("password.rule")}
        error={problem && problem !== "notTheSame" ? t(`password.${problem}`) : null}
        required
      />
      <TextField
        label={t("field.again")}
        kind="password"
        autoComplete="new-password"
        value={props.again}
        onChange={props.onAgain}
        error={problem === "notTheSame" ? t("password.notTheSame") : null}
        required
      />
    </>
  );
}
