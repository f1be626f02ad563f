import { useState } from "react";
import { Pressable } from "react-native";

import { useWords } from "@features/i18n";

import { FieldFrame, type FieldProps } from "./field-frame";
import { Icon } from "./icon";
import { TextInputPrimitive } from "./primitives/text-input";
import { target } from "./theme";

export interface TextFieldProps extends FieldProps {
  value: string;
  onChange: (text: string) => void;
  onBlur?: () => void;
  kind?: "text" | "email" | "password" | "search";
  autoComplete?: string;
  placeholder?: string;
  autoFocus?: boolean;
  /** Several lines. */
  lines?: number;
  /** A code or a path as read: mono face. */
  asRead?: boolean;
}

export function TextField(props: TextFieldProps) {
  const [shown, setShown] = useState(false);
  const secret = props.kind === "password";
  return (
    <FieldFrame
      {...props}
      tall={props.lines !== undefined}
      suffix={secret ? <ShowPassword shown={shown} onToggle={() => setShown(!shown)} /> : undefined}
    >
      {(wiring) => (
        <TextInputPrimitive
          id={wiring.id}
          name={props.name}
          value={props.value}
          onChange={props.onChange}
          onFocus={wiring.onFocus}
          onBlur={() => {
            wiring.onBlur();
            props.onBlur?.();
          }}
          variant={props.asRead ? "asReadM" : "body"}
          kind={secret && shown ? "text" : (props.kind ?? "text")}
          spellCheck={secret || props.asRead ? false : undefined}
          autoComplete={props.autoComplete}
          placeholder={props.placeholder}
          autoFocus={props.autoFocus}
          lines={props.lines}
          labelledBy={wiring.labelId}
          describedBy={wiring.describedBy}
          invalid={wiring.invalid}
          required={props.required ?? false}
          disabled={props.disabled ?? false}
        />
      )}
    </FieldFrame>
  );
}

function ShowPassword({ shown, onToggle }: { shown: boolean; onToggle: () => void }) {
  const t = useWords("ui");
  return (
    <Pressable
      role="button"
      aria-label={t(shown ? "field.hidePassword" : "field.showPassword")}
      aria-pressed={shown}
      onPress={onToggle}
      style={{ width: target.default, alignItems: "center", justifyContent: "center" }}
    >
      <Icon name={shown ? "eyeShut" : "eye"} />
    </Pressable>
  );
}
