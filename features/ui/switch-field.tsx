import { Pressable, View } from "react-native";
import Svg, { Rect } from "react-native-svg";

import { Text } from "./text";
import { stroke, target, useTheme } from "./theme";

export interface SwitchFieldProps {
  label: string;
  detail?: string;
  on: boolean;
  onChange: (on: boolean) => void;
}

/** On or off, at once: a whole row to tap. */
export function SwitchField({ label, detail, on, onChange }: SwitchFieldProps) {
  const { colour } = useTheme();
  return (
    <Pressable
      role="switch"
      aria-checked={on}
      onPress={() => onChange(!on)}
      style={{
        flexDirection: "row",
        alignItems: "center",
        justifyContent: "space-between",
        gap: 12,
        minHeight: target.field,
        paddingVertical: 8,
      }}
    >
      <View style={{ flex: 1, minWidth: 0 }}>
        <Text variant="subhead" level="none">
          {label}
        </Text>
        {detail ? (
          <Text variant="small" tone="ink2">
            {detail}
          </Text>
        ) : null}
      </View>
      <View aria-hidden>
        <Svg width={64} height={36}>
          <Rect
            x={1.5}
            y={1.5}
            width={61}
            height={33}
            rx={9}
            fill={on ? colour.ink : "none"}
            stroke={colour.ink}
            strokeWidth={stroke.run}
          />
          <Rect
            x={on ? 33 : 7}
            y={7}
            width={24}
            height={22}
            rx={5}
            fill={on ? colour.onInk : colour.ink}
          />
        </Svg>
      </View>
    </Pressable>
  );
}
