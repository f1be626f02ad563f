import { Pressable, Text, View } from "react-native";

import { typeScale, useTheme } from "../theme";

export interface SelectOption {
  value: string;
  label: string;
}

export interface SelectInputProps {
  id: string;
  value: string | null;
  options: readonly SelectOption[];
  /** Shown while nothing is chosen. */
  emptyLabel: string;
  onChange: (value: string) => void;
  onBlur: () => void;
  onFocus: () => void;
  describedBy?: string;
  invalid: boolean;
  required: boolean;
  disabled: boolean;
}

/** Without a native select the options stand open under each other. */
export function SelectInput({ value, options, onChange, disabled }: SelectInputProps) {
  const { colour } = useTheme();
  return (
    <View role="radiogroup" style={{ flex: 1 }}>
      {options.map((option) => (
        <Pressable
          key={option.value}
          role="radio"
          aria-checked={option.value === value}
          disabled={disabled}
          onPress={() => onChange(option.value)}
          style={{ minHeight: 48, justifyContent: "center" }}
        >
          <Text style={[typeScale.body, { color: colour.ink }]}>{option.label}</Text>
        </Pressable>
      ))}
    </View>
  );
}
