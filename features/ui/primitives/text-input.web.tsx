import type { CSSProperties } from "react";

import { typeScale, useTheme } from "../theme";

import { cssType } from "./css-type";
import type { TextInputPrimitiveProps } from "./text-input";

const modes = {
  text: undefined,
  email: "email",
  password: undefined,
  decimal: "decimal",
  search: "search",
  date: undefined,
  time: undefined,
} as const;

/**
 * A real input: labels, descriptions and validity reach assistive technology as browsers expect.
 * Numbers are text with a decimal keyboard, because a number input drops what it cannot read.
 */
export function TextInputPrimitive(props: TextInputPrimitiveProps) {
  const { colour } = useTheme();
  const { kind = "text" } = props;
  const style: CSSProperties = {
    ...cssType(typeScale[props.variant]),
    color: props.veiled ? "transparent" : props.invalid ? colour.madder : colour.ink,
    background: "transparent",
    border: 0,
    padding: 0,
    margin: 0,
    flex: 1,
    minWidth: 0,
    width: "100%",
    alignSelf: "stretch",
    resize: props.lines ? "vertical" : undefined,
  };
  const shared = {
    id: props.id,
    name: props.name,
    value: props.value,
    onBlur: props.onBlur,
    onFocus: props.onFocus,
    placeholder: props.placeholder,
    "aria-describedby": props.describedBy,
    "aria-invalid": props.invalid || undefined,
    "aria-required": props.required || undefined,
    disabled: props.disabled,
    autoComplete: props.autoComplete,
    autoFocus: props.autoFocus,
    spellCheck: props.spellCheck ?? kind === "text",
    "data-own-focus": true,
    style,
  };
  if (props.lines !== undefined) {
    return (
      <textarea
        {...shared}
        rows={props.lines}
        onChange={(event) => props.onChange(event.target.value)}
      />
    );
  }
  return (
    <input
      {...shared}
      type={kind === "decimal" ? "text" : kind}
      inputMode={modes[kind]}
      min={props.min}
      max={props.max}
      onChange={(event) => props.onChange(event.target.value)}
    />
  );
}
