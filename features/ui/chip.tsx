import { Pressable, View } from "react-native";

import { Icon } from "./icon";
import type { IconName } from "./icon-paths";
import { Mark } from "./mark";
import { Text } from "./text";
import { radius, target, useTheme } from "./theme";

export interface ChipProps {
  label: string;
  tone?: "plain" | "look" | "wrong" | "line" | "picked";
  icon?: IconName;
}

/** A small fact. Trouble carries its mark as well as its colour. */
export function Chip({ label, tone = "plain", icon }: ChipProps) {
  const { colour } = useTheme();
  const fills = {
    plain: colour.slateTint,
    look: colour.brassTint,
    wrong: colour.madderTint,
    line: "transparent",
    picked: colour.mark,
  };
  return (
    <View
      style={{
        flexDirection: "row",
        alignItems: "center",
        alignSelf: "flex-start",
        gap: 6,
        minHeight: 26,
        paddingHorizontal: 9,
        paddingVertical: 3,
        borderRadius: radius.small,
        borderWidth: 1,
        borderColor: tone === "line" ? colour.ruleStrong : "transparent",
        backgroundColor: fills[tone],
      }}
    >
      {icon ? <Icon name={icon} size={17} tone={tone === "picked" ? "onMark" : "ink"} /> : null}
      {tone === "look" ? <Mark kind="look" size={15} silent /> : null}
      {tone === "wrong" ? <Mark kind="wrong" size={15} silent /> : null}
      <Text variant="chip" tone={tone === "picked" ? "onMark" : "ink"}>
        {label}
      </Text>
    </View>
  );
}

export interface TapChipProps {
  label: string;
  picked?: boolean;
  onPress: () => void;
  size?: "default" | "field" | "dense";
  grow?: boolean;
}

/** A chip to tap: a shortcut, or one of several choices. */
export function TapChip({ label, picked, onPress, size = "default", grow }: TapChipProps) {
  const { colour } = useTheme();
  return (
    <Pressable
      role="button"
      aria-pressed={picked}
      onPress={onPress}
      style={{
        minHeight: target[size],
        paddingHorizontal: size === "dense" ? 10 : 14,
        flexGrow: grow ? 1 : 0,
        borderRadius: radius.button,
        borderWidth: picked ? 2 : 1.5,
        borderColor: picked ? colour.mark : colour.ruleStrong,
        backgroundColor: picked ? colour.markTint : "transparent",
        justifyContent: "center",
        alignItems: "center",
      }}
    >
      <Text variant={size === "dense" ? "chip" : "nav"}>{label}</Text>
    </Pressable>
  );
}
