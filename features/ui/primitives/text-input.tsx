import { TextInput } from "react-native";

import { typeScale, useTheme, type TypeName } from "../theme";

export interface TextInputPrimitiveProps {
  id: string;
  name?: string;
  value: string;
  onChange: (text: string) => void;
  onBlur: () => void;
  onFocus: () => void;
  variant: TypeName;
  kind?: "text" | "email" | "password" | "decimal" | "search" | "date" | "time";
  autoComplete?: string;
  placeholder?: string;
  labelledBy: string;
  describedBy?: string;
  invalid: boolean;
  required: boolean;
  disabled: boolean;
  autoFocus?: boolean;
  lines?: number;
  spellCheck?: boolean;
  min?: string;
  max?: string;
  /** The words of something else stand over it: keep its own out of sight. */
  veiled?: boolean;
}

const modes = {
  text: "text",
  email: "email",
  password: "text",
  decimal: "decimal",
  search: "search",
  date: "text",
  time: "text",
} as const;

export function TextInputPrimitive(props: TextInputPrimitiveProps) {
  const { colour } = useTheme();
  return (
    <TextInput
      nativeID={props.id}
      value={props.value}
      onChangeText={props.onChange}
      onBlur={props.onBlur}
      onFocus={props.onFocus}
      inputMode={modes[props.kind ?? "text"]}
      secureTextEntry={props.kind === "password"}
      placeholder={props.placeholder}
      aria-labelledby={props.labelledBy}
      editable={!props.disabled}
      autoFocus={props.autoFocus}
      multiline={props.lines !== undefined}
      style={[typeScale[props.variant], { color: colour.ink, flex: 1 }]}
    />
  );
}
