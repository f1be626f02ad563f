import { typeScale, useTheme } from "../theme";

import { cssType } from "./css-type";
import type { SelectInputProps } from "./select-input";

/** The browser's own select: on phones it opens the system's wheel, on desks it takes the keyboard. */
export function SelectInput(props: SelectInputProps) {
  const { colour } = useTheme();
  return (
    <select
      id={props.id}
      value={props.value ?? ""}
      onChange={(event) => props.onChange(event.target.value)}
      onBlur={props.onBlur}
      onFocus={props.onFocus}
      aria-describedby={props.describedBy}
      aria-invalid={props.invalid || undefined}
      aria-required={props.required || undefined}
      disabled={props.disabled}
      data-own-focus
      style={{
        ...cssType(typeScale.body),
        color: props.value === null ? colour.ink3 : colour.ink,
        background: "transparent",
        border: 0,
        padding: "0 36px 0 14px",
        margin: 0,
        flex: 1,
        minWidth: 0,
        width: "100%",
        alignSelf: "stretch",
        appearance: "none",
        textOverflow: "ellipsis",
        cursor: "pointer",
      }}
    >
      {props.value === null ? (
        <option value="" disabled>
          {props.emptyLabel}
        </option>
      ) : null}
      {props.options.map((option) => (
        <option
          key={option.value}
          value={option.value}
          style={{ color: colour.ink, background: colour.sheet }}
        >
          {option.label}
        </option>
      ))}
    </select>
  );
}
