import type { ReactNode } from "react";
import { View } from "react-native";

import { Icon } from "./icon";
import type { IconName } from "./icon-paths";
import { Mark } from "./mark";
import { Strong, Text } from "./text";
import { radius, useTheme } from "./theme";

export interface BannerProps {
  kind: "note" | "look" | "wrong";
  /** Bold first words. */
  lead?: string;
  children?: ReactNode;
  /** At most one way on: a TextLink or a Button. */
  action?: ReactNode;
  icon?: IconName;
  /** Read out when it appears. */
  live?: boolean;
}

export function Banner({ kind, lead, children, action, icon, live }: BannerProps) {
  const { colour } = useTheme();
  const looks = {
    note: [colour.well, colour.well],
    look: [colour.brassFaint, colour.brassTint],
    wrong: [colour.madderFaint, colour.madderTint],
  } as const;
  const [fill, edge] = looks[kind];
  return (
    <View
      role={live ? (kind === "wrong" ? "alert" : "status") : undefined}
      style={{
        flexDirection: "row",
        gap: 12,
        paddingVertical: 12,
        paddingHorizontal: 14,
        borderRadius: radius.button,
        borderWidth: 1,
        borderColor: edge,
        backgroundColor: fill,
        alignItems: "flex-start",
      }}
    >
      {icon ? <Icon name={icon} size={20} /> : <Mark kind={kind} size={20} />}
      <View style={{ flex: 1, minWidth: 0, gap: 6 }}>
        <Text variant="bodyWide">
          {lead ? <Strong>{lead}</Strong> : null}
          {lead && children ? " " : null}
          {children}
        </Text>
        {action}
      </View>
    </View>
  );
}
