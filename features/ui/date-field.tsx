import { useState } from "react";
import { View } from "react-native";

import { useFormat } from "@features/i18n";

import { FieldFrame, type FieldProps } from "./field-frame";
import { TextInputPrimitive } from "./primitives/text-input";
import { Text } from "./text";

export interface DateFieldProps extends FieldProps {
  /** Calendar day YYYY-MM-DD in the site's zone, or null. */
  value: string | null;
  onChange: (isoDay: string | null) => void;
  min?: string;
  max?: string;
}

/**
 * A calendar day through the browser's own date input, which types, steps and opens a calendar.
 * That input writes dates the way the device does, so while nobody types, the day stands over it as
 * the language on screen writes it.
 */
export function DateField(props: DateFieldProps) {
  const format = useFormat();
  const [editing, setEditing] = useState(false);
  const veiled = props.value !== null && !editing;
  return (
    <FieldFrame {...props}>
      {(wiring) => (
        <>
          <TextInputPrimitive
            id={wiring.id}
            name={props.name}
            kind="date"
            variant="body"
            value={props.value ?? ""}
            onChange={(text) => props.onChange(text === "" ? null : text)}
            onFocus={() => {
              setEditing(true);
              wiring.onFocus();
            }}
            onBlur={() => {
              setEditing(false);
              wiring.onBlur();
            }}
            veiled={veiled}
            min={props.min}
            max={props.max}
            labelledBy={wiring.labelId}
            describedBy={wiring.describedBy}
            invalid={wiring.invalid}
            required={props.required ?? false}
            disabled={props.disabled ?? false}
          />
          {veiled && props.value ? (
            <View
              aria-hidden
              style={{
                position: "absolute",
                left: 14,
                top: 0,
                bottom: 0,
                justifyContent: "center",
                pointerEvents: "none",
              }}
            >
              <Text noWrap>{format.day(props.value, "dayMonthYear")}</Text>
            </View>
          ) : null}
        </>
      )}
    </FieldFrame>
  );
}
