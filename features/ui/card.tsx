import type { ReactNode } from "react";
import { View, type StyleProp, type ViewStyle } from "react-native";

import { radius, space, useTheme } from "./theme";

export interface CardProps {
  pad?: keyof typeof space;
  /** Names the card as a region for screen readers. */
  label?: string;
  style?: StyleProp<ViewStyle>;
  children: ReactNode;
}

/** A sheet of paper with a hairline; cards never cast a shadow. */
export function Card({ pad = 4, label, style, children }: CardProps) {
  const { colour } = useTheme();
  return (
    <View
      {...(label ? { role: "region" as const, "aria-label": label } : {})}
      style={[
        {
          backgroundColor: colour.sheet,
          borderWidth: 1,
          borderColor: colour.rule,
          borderRadius: radius.card,
          padding: space[pad],
        },
        style,
      ]}
    >
      {children}
    </View>
  );
}

export function Divider({ strong }: { strong?: boolean }) {
  const { colour } = useTheme();
  const line = strong
    ? { height: 2.5, backgroundColor: colour.ink }
    : { height: 1, backgroundColor: colour.rule };
  return <View aria-hidden style={line} />;
}
