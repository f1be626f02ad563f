import type { ReactNode } from "react";
import { View, type StyleProp, type ViewStyle } from "react-native";

import { space } from "./theme";

type Gap = keyof typeof space;

interface StackProps {
  gap?: Gap;
  align?: ViewStyle["alignItems"];
  justify?: ViewStyle["justifyContent"];
  grow?: boolean;
  wrap?: boolean;
  style?: StyleProp<ViewStyle>;
  children?: ReactNode;
}

/** Things under each other. */
export function Stack({ gap = 0, align, justify, grow, style, children }: StackProps) {
  return (
    <View
      style={[
        { gap: space[gap], alignItems: align, justifyContent: justify },
        grow ? { flex: 1, minWidth: 0 } : null,
        style,
      ]}
    >
      {children}
    </View>
  );
}

/** Things beside each other; they wrap where asked, so text at 200 % still fits. */
export function Row({
  gap = 2,
  align = "center",
  justify,
  grow,
  wrap,
  style,
  children,
}: StackProps) {
  return (
    <View
      style={[
        {
          flexDirection: "row",
          gap: space[gap],
          alignItems: align,
          justifyContent: justify,
          flexWrap: wrap ? "wrap" : "nowrap",
        },
        grow ? { flex: 1, minWidth: 0 } : null,
        style,
      ]}
    >
      {children}
    </View>
  );
}
