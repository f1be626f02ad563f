import { View } from "react-native";

import { useWords } from "@features/i18n";

import { FieldFrame, type FieldProps } from "./field-frame";
import { Icon } from "./icon";
import { SelectInput, type SelectOption } from "./primitives/select-input";

export interface SelectFieldProps<Value extends string> extends FieldProps {
  value: Value | null;
  options: readonly (SelectOption & { value: Value })[];
  onChange: (value: Value) => void;
  /** Words while nothing is chosen; “Choose” by default. */
  emptyLabel?: string;
}

export function SelectField<Value extends string>(props: SelectFieldProps<Value>) {
  const t = useWords("ui");
  return (
    <FieldFrame {...props} flush>
      {(wiring) => (
        <>
          <SelectInput
            id={wiring.id}
            value={props.value}
            options={props.options}
            emptyLabel={props.emptyLabel ?? t("field.choose")}
            onChange={(chosen) => {
              const option = props.options.find(({ value }) => value === chosen);
              if (option) props.onChange(option.value);
            }}
            onFocus={wiring.onFocus}
            onBlur={wiring.onBlur}
            describedBy={wiring.describedBy}
            invalid={wiring.invalid}
            required={props.required ?? false}
            disabled={props.disabled ?? false}
          />
          <View
            aria-hidden
            style={{
              position: "absolute",
              right: 12,
              top: 0,
              bottom: 0,
              justifyContent: "center",
              pointerEvents: "none",
            }}
          >
            <Icon name="down" size={18} />
          </View>
        </>
      )}
    </FieldFrame>
  );
}
