import type { ReactNode } from "react";
import { View } from "react-native";
import { layout, useBreakpoint } from "@features/ui";

const SIDE_WIDTH = 358;

/** The work at left and what belongs to it at right; one under the other where there is no room. */
export function SideColumn({ main, side }: { main: ReactNode; side: ReactNode }) {
  const wide = useBreakpoint() === "wide";
  return (
    <View
      style={{ flexDirection: wide ? "row" : "column", gap: wide ? layout.wide.gutter + 8 : 20 }}
    >
      <View style={{ flex: wide ? 1 : undefined, minWidth: 0, gap: 16 }}>{main}</View>
      <View style={{ width: wide ? SIDE_WIDTH : undefined, gap: 20 }}>{side}</View>
    </View>
  );
}
