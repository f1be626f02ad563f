import { useId } from "react";
import { Pressable, View } from "react-native";
import Svg, { Circle } from "react-native-svg";

import { FieldNote, type FieldProps } from "./field-frame";
import { Text } from "./text";
import { radius, target, useTheme } from "./theme";
import { useRoving } from "./use-roving";

export interface Choice<Value extends string> {
  value: Value;
  label: string;
  /** What choosing it means. */
  detail?: string;
}

export interface ChoiceTilesProps<Value extends string> extends Pick<
  FieldProps,
  "label" | "hint" | "error" | "required" | "size" | "disabled"
> {
  /** Null: nothing is picked, because the choice must be made. */
  value: Value | null;
  choices: readonly Choice<Value>[];
  onChange: (value: Value) => void;
  /** Beside each other from tablet up. */
  columns?: 1 | 2 | 3;
  labelHidden?: boolean;
}

/** Big radio rows; the picked one has a tint, a 2 px border and a filled mark. */
export function ChoiceTiles<Value extends string>(props: ChoiceTilesProps<Value>) {
  const { colour } = useTheme();
  const id = useId();
  const picked = props.choices.findIndex(({ value }) => value === props.value);
  const member = useRoving(props.choices.length, (index) => {
    const choice = props.choices[index];
    if (choice && !props.disabled) props.onChange(choice.value);
  });
  const note = props.error ?? props.hint;
  const columns = props.columns ?? 1;
  return (
    <View style={{ gap: 6 }}>
      {props.labelHidden ? null : (
        <Text variant="fieldLabel" id={`${id}-label`}>
          {props.label}
        </Text>
      )}
      <View
        role="radiogroup"
        {...(props.labelHidden
          ? { "aria-label": props.label }
          : { "aria-labelledby": `${id}-label` })}
        {...(note ? { "aria-describedby": `${id}-note` } : {})}
        aria-required={props.required}
        style={{
          gap: 8,
          flexDirection: columns > 1 ? "row" : "column",
          flexWrap: columns > 1 ? "wrap" : "nowrap",
        }}
      >
        {props.choices.map((choice, index) => {
          const on = index === picked;
          return (
            <Pressable
              key={choice.value}
              {...member(index)}
              role="radio"
              aria-checked={on}
              aria-disabled={props.disabled}
              tabIndex={on || (picked < 0 && index === 0) ? 0 : -1}
              onPress={() => (props.disabled ? undefined : props.onChange(choice.value))}
              style={{
                flexDirection: "row",
                alignItems: "center",
                gap: 12,
                minHeight: props.size === "field" ? target.field : target.default,
                flexGrow: columns > 1 ? 1 : 0,
                flexBasis: columns > 1 ? `${Math.floor(100 / columns) - 3}%` : "auto",
                minWidth: columns > 1 ? 180 : undefined,
                paddingHorizontal: on ? 13.5 : 14,
                paddingVertical: 10,
                borderRadius: radius.button,
                borderWidth: on ? 2 : 1.5,
                borderColor: on ? colour.mark : colour.ruleStrong,
                backgroundColor: on ? colour.markTint : colour.sheet,
              }}
            >
              <RadioMark on={on} />
              <View style={{ flex: 1, minWidth: 0 }}>
                <Text variant="subhead" level="none">
                  {choice.label}
                </Text>
                {choice.detail ? (
                  <Text variant="small" tone="ink2">
                    {choice.detail}
                  </Text>
                ) : null}
              </View>
            </Pressable>
          );
        })}
      </View>
      {note ? <FieldNote id={`${id}-note`} error={props.error} hint={props.hint} /> : null}
    </View>
  );
}

function RadioMark({ on }: { on: boolean }) {
  const { colour } = useTheme();
  return (
    <View aria-hidden>
      <Svg width={24} height={24}>
        <Circle
          cx={12}
          cy={12}
          r={10}
          fill={colour.sheet}
          stroke={on ? colour.mark : colour.ruleStrong}
          strokeWidth={2}
        />
        {on ? <Circle cx={12} cy={12} r={5.5} fill={colour.mark} /> : null}
      </Svg>
    </View>
  );
}
