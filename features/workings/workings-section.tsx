import type { ReactNode } from "react";
import { View } from "react-native";

import { Text, useTheme } from "@features/ui";

/** A part of the workings under its heading. */
export function WorkingsSection({ title, children }: { title: string; children: ReactNode }) {
  return (
    <View style={{ marginTop: 14 }}>
      <Text variant="subhead" level={3} style={{ marginBottom: 4 }}>
        {title}
      </Text>
      {children}
    </View>
  );
}

/** One row under a hairline; the row that sums up stands under an ink rule. */
export function Ruled(props: { strong?: boolean; role?: "listitem"; children: ReactNode }) {
  const { colour } = useTheme();
  return (
    <View
      role={props.role}
      style={{
        flexDirection: "row",
        alignItems: "center",
        gap: 8,
        minHeight: 32,
        paddingVertical: 4,
        borderTopWidth: props.strong ? 2 : 1,
        borderTopColor: props.strong ? colour.ink : colour.rule,
      }}
    >
      {props.children}
    </View>
  );
}
