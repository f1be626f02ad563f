import { useId, type ReactNode } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";

import { Button } from "./button";
import { Overlay } from "./overlay";
import { squaredPaper } from "./squared-paper";
import { Row } from "./stack";
import { Text } from "./text";
import { layout, radius, useBreakpoint, useTheme, webStyle } from "./theme";

export interface SheetProps {
  open: boolean;
  title: string;
  onClose: () => void;
  children: ReactNode;
  /** `bottom`: pickers and More. `side`: full height on a phone, right half on tablets and desks. */
  kind?: "bottom" | "side";
  /** Space left free at the foot of the screen, for the phone bar. */
  foot?: number;
  /** What it is made of: paper, squared for workings, or the page ground where it grows out of the bar. */
  ground?: "sheet" | "pad" | "squared";
  /** Buttons before the one that closes it. */
  actions?: ReactNode;
  /** What the closing button is called, where “Close” would not do. */
  closeLabel?: string;
}

/** A panel over the page. Escape, the close button and a tap outside shut it. */
export function Sheet(props: SheetProps) {
  const id = useId();
  const t = useWords("ui");
  const { colour, float } = useTheme();
  const breakpoint = useBreakpoint();
  if (!props.open) return null;
  const bottom = (props.kind ?? "bottom") === "bottom";
  const wide = breakpoint !== "phone";
  const place = bottom
    ? wide
      ? {
          margin: "auto" as const,
          width: "100%" as const,
          maxWidth: 440,
          borderRadius: radius.card,
        }
      : {
          marginTop: "auto" as const,
          width: "100%" as const,
          borderTopLeftRadius: radius.sheet,
          borderTopRightRadius: radius.sheet,
        }
    : {
        marginLeft: "auto" as const,
        width: "100%" as const,
        maxWidth: wide ? layout.wide.workings : undefined,
      };
  return (
    <Overlay role="dialog" labelledBy={id} onClose={props.onClose} foot={props.foot}>
      <View
        style={[
          {
            backgroundColor: colour[props.ground === "pad" ? "pad" : "sheet"],
            paddingHorizontal: 16,
            paddingTop: 12,
            paddingBottom: 20,
          },
          place,
          props.ground === "squared" ? squaredPaper(colour) : null,
          webStyle({
            boxShadow: props.foot ? "none" : float,
            maxHeight: bottom ? "88%" : "100dvh",
            overflowY: "auto",
            ...(bottom ? {} : { height: "100dvh" }),
          }),
        ]}
      >
        {bottom && !wide ? (
          <View
            aria-hidden
            style={{
              width: 44,
              height: 5,
              borderRadius: 3,
              backgroundColor: colour.ruleStrong,
              alignSelf: "center",
              marginBottom: 8,
            }}
          />
        ) : null}
        {/* Above what follows: a menu in it opens over the content. */}
        <Row justify="space-between" style={{ marginBottom: 8, zIndex: 20 }}>
          <Text variant="heading" id={id}>
            {props.title}
          </Text>
          <Row gap={1}>
            {props.actions}
            <Button
              kind="quiet"
              icon="close"
              iconOnly
              label={props.closeLabel ?? t("dialog.close")}
              onPress={props.onClose}
            />
          </Row>
        </Row>
        {props.children}
      </View>
    </Overlay>
  );
}

/**
 * Details beside the page on wide screens (372 px), a sheet below that.
 * On wide screens it is always there; `open` matters on phones and tablets.
 */
export function Inspector(props: {
  title: string;
  open: boolean;
  onClose: () => void;
  children: ReactNode;
}) {
  const { colour } = useTheme();
  const wide = useBreakpoint() === "wide";
  if (!wide) {
    return (
      <Sheet kind="side" title={props.title} open={props.open} onClose={props.onClose}>
        {props.children}
      </Sheet>
    );
  }
  return (
    <View
      role="complementary"
      aria-label={props.title}
      style={{
        width: layout.wide.inspector,
        flexShrink: 0,
        backgroundColor: colour.sheet,
        borderLeftWidth: 1,
        borderLeftColor: colour.rule,
        padding: 24,
        gap: 16,
      }}
    >
      <Text variant="heading">{props.title}</Text>
      {props.children}
    </View>
  );
}
