import { Pressable, View } from "react-native";

import { Text } from "./text";
import { radius, stroke, target, useTheme } from "./theme";
import { useRoving } from "./use-roving";

export interface SegmentsProps<Value extends string> {
  label: string;
  /** Null: nothing picked yet, because a choice must be made. */
  value: Value | null;
  options: readonly { value: Value; label: string }[];
  onChange: (value: Value) => void;
  size?: "dense" | "default" | "field";
  full?: boolean;
}

/** A two-way (or three-way) switch: the picked part is filled with ink. */
export function Segments<Value extends string>(props: SegmentsProps<Value>) {
  const { colour } = useTheme();
  const picked = props.options.findIndex(({ value }) => value === props.value);
  const member = useRoving(props.options.length, (index) => {
    const option = props.options[index];
    if (option) props.onChange(option.value);
  });
  return (
    <View
      role="radiogroup"
      aria-label={props.label}
      style={{
        flexDirection: "row",
        alignSelf: props.full ? "stretch" : "flex-start",
        borderWidth: stroke.control,
        borderColor: colour.ruleStrong,
        borderRadius: radius.button,
        backgroundColor: colour.sheet,
      }}
    >
      {props.options.map((option, index) => {
        const on = index === picked;
        return (
          <Pressable
            key={option.value}
            {...member(index)}
            role="radio"
            aria-checked={on}
            tabIndex={on || (picked < 0 && index === 0) ? 0 : -1}
            onPress={() => props.onChange(option.value)}
            style={{
              flexGrow: props.full ? 1 : 0,
              flexBasis: props.full ? 0 : "auto",
              minHeight: target[props.size ?? "default"] - 2 * stroke.control,
              justifyContent: "center",
              alignItems: "center",
              paddingHorizontal: 14,
              borderRadius: on ? radius.button - 2 : 0,
              backgroundColor: on ? colour.ink : "transparent",
            }}
          >
            <Text variant={on ? "navOn" : "nav"} tone={on ? "onInk" : "ink"} align="center">
              {option.label}
            </Text>
          </Pressable>
        );
      })}
    </View>
  );
}
