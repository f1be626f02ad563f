import { useWords } from "@features/i18n";
import { TextField } from "@features/ui";

import { passwordProblem } from "./password-rules";

/**
 * A new password, typed once because it can be shown. Its rules stand there before anybody types;
 * what is wrong shows after the first try and follows the typing from then on.
 */
export function NewPasswordField(props: {
  label: string;
  value: string;
  onChange: (text: string) => void;
  tried: boolean;
  /** What the server said against it. */
  refused: string | null;
  size?: "default" | "field";
}) {
  const t = useWords("people");
  const problem = props.tried ? passwordProblem(props.value) : null;
  return (
    <TextField
      label={props.label}
      kind="password"
      name="new-password"
      autoComplete="new-password"
      size={props.size}
      value={props.value}
      onChange={props.onChange}
      hint={t("field.passwordRules")}
      error={problem ? t(`field.${problem}`, { count: props.value.length }) : props.refused}
      required
    />
  );
}
