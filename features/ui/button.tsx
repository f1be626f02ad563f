import { Link } from "expo-router";
import { forwardRef, useId, type ReactNode } from "react";
import { Pressable, View, type GestureResponderEvent } from "react-native";

import { Icon } from "./icon";
import type { IconName } from "./icon-paths";
import { pressOpacity } from "./press-style";
import { Stack } from "./stack";
import { Text } from "./text";
import { radius, stroke, target, useTheme, type ColourRole } from "./theme";

export type ButtonKind = "primary" | "second" | "quiet" | "stop";

interface ButtonBase {
  /** A verb: “Import 12,042 rows”. */
  label: string;
  /** Longer name for screen readers where the label alone is not enough: “Remove Imogen Tarr”. */
  said?: string;
  kind?: ButtonKind;
  icon?: IconName;
  /** 40 for dense wide panels, 56 for field screens. */
  size?: "dense" | "default" | "field";
  full?: boolean;
  /** Why it is off, shown beside it and read with it. Set it and the button is off. */
  offBecause?: string;
  /** Off while something it started is under way; the label stays. */
  busy?: boolean;
  expanded?: boolean;
  /** Rendered hidden label with only the icon showing. */
  iconOnly?: boolean;
  id?: string;
}

export type ButtonProps = ButtonBase &
  (
    | { onPress: (event: GestureResponderEvent) => void; href?: undefined; submit?: undefined }
    | { href: string; onPress?: undefined; submit?: undefined }
    /** Sends the form it stands in. */
    | { submit: true; onPress?: undefined; href?: undefined }
  );

const heights = { dense: target.dense, default: target.default, field: target.field } as const;

export const Button = forwardRef<View, ButtonProps>(function Button(props, ref) {
  const reasonId = useId();
  const off = props.offBecause !== undefined || props.busy === true;
  const body = <ButtonFace {...props} off={off} />;
  const shared = {
    ref,
    id: props.id,
    role: "button" as const,
    "aria-label": props.said ?? (props.iconOnly ? props.label : undefined),
    "aria-disabled": off,
    "aria-busy": props.busy,
    "aria-expanded": props.expanded,
    style: props.full ? { alignSelf: "stretch" as const } : { alignSelf: "flex-start" as const },
  };
  const described = props.offBecause ? { "aria-describedby": reasonId } : {};
  const button =
    props.href !== undefined && !off ? (
      <Link href={props.href} asChild>
        <Pressable {...shared} role="link">
          {({ pressed }) => <View style={pressOpacity(pressed)}>{body}</View>}
        </Pressable>
      </Link>
    ) : (
      <Pressable
        {...shared}
        {...described}
        onPress={(event) => {
          if (off) return;
          if (props.submit) requestSubmit(event);
          else props.onPress?.(event);
        }}
      >
        {({ pressed }) => <View style={pressOpacity(pressed && !off)}>{body}</View>}
      </Pressable>
    );
  if (!props.offBecause) return button;
  return (
    <Stack gap={1} style={props.full ? { alignSelf: "stretch" } : null}>
      {button}
      <Text variant="small" tone="ink2" id={reasonId}>
        {props.offBecause}
      </Text>
    </Stack>
  );
});

/** Sends the form around a button, as a browser's own submit button would. */
function requestSubmit(event: GestureResponderEvent): void {
  const element = event.currentTarget as unknown;
  if (element instanceof Element) element.closest("form")?.requestSubmit();
}

function ButtonFace(props: ButtonProps & { off: boolean }): ReactNode {
  const { colour } = useTheme();
  const { kind = "primary", size = "default", off } = props;
  const looks: Record<ButtonKind, [fill: string, edge: string, words: ColourRole]> = {
    primary: [colour.ink, colour.ink, "onInk"],
    second: ["transparent", colour.ruleStrong, "ink"],
    quiet: ["transparent", "transparent", "ink"],
    stop: [colour.madder, colour.madder, "onMadder"],
  };
  const [fill, edge, words] = off ? ([colour.well, colour.rule, "ink3"] as const) : looks[kind];
  const padding = kind === "quiet" ? 12 : size === "dense" ? 14 : 20;
  return (
    <View
      style={{
        minHeight: heights[size],
        minWidth: heights[size],
        paddingHorizontal: props.iconOnly ? 0 : padding,
        paddingVertical: 6,
        borderRadius: radius.button,
        borderWidth: stroke.control,
        borderColor: edge,
        backgroundColor: fill,
        flexDirection: "row",
        gap: 8,
        alignItems: "center",
        justifyContent: "center",
      }}
    >
      {props.icon ? (
        <Icon name={props.icon} tone={words} size={size === "dense" ? 20 : 22} />
      ) : null}
      {props.iconOnly ? null : (
        <Text variant="button" tone={words} align="center">
          {props.label}
        </Text>
      )}
    </View>
  );
}
