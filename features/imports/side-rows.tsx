import type { ReactNode } from "react";
import { View } from "react-native";
import { Text, useTheme } from "@features/ui";

export interface SideRow {
  readonly label: string;
  /** Where several rows carry the same label. */
  readonly key?: string;
  readonly value: string;
  /** Came off the file: set in mono. */
  readonly asRead?: boolean;
  readonly lead?: ReactNode;
  readonly strong?: boolean;
}

/** A short list at the side: label at left, value at right, hairlines between. */
export function SideRows({ title, rows }: { title: string; rows: readonly SideRow[] }) {
  const { colour } = useTheme();
  return (
    <View>
      <Text variant="subhead" level={2}>
        {title}
      </Text>
      <View role="list" aria-label={title} style={{ marginTop: 6 }}>
        {rows.map((row) => (
          <View
            key={row.key ?? row.label}
            role="listitem"
            style={{
              flexDirection: "row",
              alignItems: "center",
              gap: 12,
              minHeight: 40,
              paddingVertical: 8,
              borderTopWidth: row.strong ? 2 : 1,
              borderTopColor: row.strong ? colour.ink : colour.rule,
            }}
          >
            {row.lead}
            <View style={{ flex: 1, minWidth: 0 }}>
              <Text
                variant={row.strong ? "subhead" : "bodyWide"}
                level="none"
                tone={row.strong ? "ink" : "ink2"}
              >
                {row.label}
              </Text>
            </View>
            <View style={{ flexShrink: 1 }}>
              <Text variant={row.asRead ? "asReadM" : "bodyWide"} align="right">
                {row.value}
              </Text>
            </View>
          </View>
        ))}
      </View>
    </View>
  );
}
