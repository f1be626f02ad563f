import { Link } from "expo-router";
import type { ReactNode } from "react";
import { Pressable, View } from "react-native";

import { Icon } from "./icon";
import type { IconName } from "./icon-paths";
import { Text } from "./text";
import { target, useTheme } from "./theme";

export interface ListRowProps {
  title: string;
  detail?: string;
  /** In front: a Mark, a LoopTag. */
  lead?: ReactNode;
  icon?: IconName;
  /** At the right: a Figure, a Chip, a few words. */
  trail?: ReactNode;
  href?: string;
  onPress?: () => void;
  first?: boolean;
}

/** One line of a list, with a hairline above; goes somewhere where it has an href. */
export function ListRow(props: ListRowProps) {
  const { colour } = useTheme();
  const goes = props.href !== undefined || props.onPress !== undefined;
  const face = (
    <View
      style={{
        flexDirection: "row",
        alignItems: "center",
        gap: 12,
        minHeight: target.field,
        paddingVertical: 8,
        borderTopWidth: props.first ? 0 : 1,
        borderTopColor: colour.rule,
      }}
    >
      {props.icon ? <Icon name={props.icon} size={24} /> : null}
      {props.lead}
      <View style={{ flex: 1, minWidth: 0 }}>
        <Text variant="subhead" level="none">
          {props.title}
        </Text>
        {props.detail ? (
          <Text variant="small" tone="ink2">
            {props.detail}
          </Text>
        ) : null}
      </View>
      {typeof props.trail === "string" ? (
        <Text variant="small" tone="ink2">
          {props.trail}
        </Text>
      ) : (
        props.trail
      )}
      {goes ? <Icon name="right" size={20} /> : null}
    </View>
  );
  if (props.href !== undefined) {
    return (
      <Link href={props.href} asChild>
        <Pressable role="link">{face}</Pressable>
      </Link>
    );
  }
  if (props.onPress) {
    return (
      <Pressable role="button" onPress={props.onPress}>
        {face}
      </Pressable>
    );
  }
  return face;
}

export interface Definition {
  label: string;
  value: ReactNode;
  /** Came off an instrument or a file: mono. */
  asRead?: boolean;
}

export interface DefinitionRowsProps {
  rows: readonly Definition[];
  /** A heading above. */
  title?: string;
  /** Name for screen readers where there is no title. */
  label?: string;
}

/** Label and value pairs: what a pipe is, where a meter sits. */
export function DefinitionRows({ rows, title, label }: DefinitionRowsProps) {
  const { colour } = useTheme();
  return (
    <View>
      {title ? (
        <Text variant="subhead" style={{ marginBottom: 4 }}>
          {title}
        </Text>
      ) : null}
      <View role="list" aria-label={label ?? title}>
        {rows.map((row, index) => (
          <View
            key={row.label}
            role="listitem"
            style={{
              flexDirection: "row",
              gap: 12,
              paddingVertical: 8,
              borderTopWidth: index === 0 && !title ? 0 : 1,
              borderTopColor: colour.rule,
            }}
          >
            <View style={{ flexBasis: "40%", flexShrink: 0 }}>
              <Text variant="bodyWide" tone="ink2">
                {row.label}
              </Text>
            </View>
            <View style={{ flex: 1, minWidth: 0 }}>
              {typeof row.value === "string" || typeof row.value === "number" ? (
                <Text variant={row.asRead ? "asReadM" : "bodyWide"}>{row.value}</Text>
              ) : (
                row.value
              )}
            </View>
          </View>
        ))}
      </View>
    </View>
  );
}
