import { useId } from "react";
import { Pressable, View } from "react-native";
import Svg, { Path, Rect } from "react-native-svg";

import { FieldNote } from "./field-frame";
import { Text } from "./text";
import { target, useTheme } from "./theme";

export interface CheckFieldProps {
  label: string;
  checked: boolean;
  onChange: (checked: boolean) => void;
  hint?: string;
  error?: string | null;
  disabled?: boolean;
}

export function CheckField({ label, checked, onChange, hint, error, disabled }: CheckFieldProps) {
  const noteId = useId();
  const described = error || hint ? { "aria-describedby": noteId } : {};
  return (
    <View style={{ gap: 2 }}>
      <Pressable
        role="checkbox"
        aria-checked={checked}
        aria-disabled={disabled}
        {...described}
        onPress={() => (disabled ? undefined : onChange(!checked))}
        style={{ minHeight: target.default, flexDirection: "row", alignItems: "center", gap: 12 }}
      >
        <CheckBox checked={checked} />
        <Text style={{ flex: 1 }} tone={disabled ? "ink3" : "ink"}>
          {label}
        </Text>
      </Pressable>
      {error || hint ? <FieldNote id={noteId} error={error} hint={hint} /> : null}
    </View>
  );
}

export function CheckBox({ checked }: { checked: boolean }) {
  const { colour } = useTheme();
  return (
    <View aria-hidden>
      <Svg width={24} height={24}>
        <Rect
          x={1.5}
          y={1.5}
          width={21}
          height={21}
          rx={4}
          fill={checked ? colour.mark : colour.sheet}
          stroke={checked ? colour.mark : colour.ruleStrong}
          strokeWidth={2}
        />
        {checked ? (
          <Path
            d="M6.500 12.500l4 4 7-8.500"
            fill="none"
            stroke={colour.onMark}
            strokeWidth={2.4}
            strokeLinecap="round"
            strokeLinejoin="round"
          />
        ) : null}
      </Svg>
    </View>
  );
}
