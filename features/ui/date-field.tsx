import { FieldFrame, type FieldProps } from "./field-frame";
import { TextInputPrimitive } from "./primitives/text-input";

export interface DateFieldProps extends FieldProps {
  /** Calendar day YYYY-MM-DD in the site's zone, or null. */
  value: string | null;
  onChange: (isoDay: string | null) => void;
  min?: string;
  max?: string;
}

/** A calendar day through the browser's own date input, which types, steps and opens a calendar. */
export function DateField(props: DateFieldProps) {
  return (
    <FieldFrame {...props}>
      {(wiring) => (
        <TextInputPrimitive
          id={wiring.id}
          name={props.name}
          kind="date"
          variant="body"
          value={props.value ?? ""}
          onChange={(text) => props.onChange(text === "" ? null : text)}
          onFocus={wiring.onFocus}
          onBlur={wiring.onBlur}
          min={props.min}
          max={props.max}
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
