import { Link } from "expo-router";
import { Fragment } from "react";
import { Pressable, View } from "react-native";

import { Card } from "./card";
import { Icon } from "./icon";
import { Text } from "./text";
import { VisuallyHidden } from "./visually-hidden";
import type { TableProps } from "./table-props";

/** A table on a phone: name top left, main figure top right, the rest beneath. */
export function TableCards<Row>(props: TableProps<Row>) {
  const { rows, card, rowKey } = props;
  if (rows.length === 0 && props.empty) return <>{props.empty}</>;
  return (
    <View style={{ gap: 12 }}>
      {/* Beside the list: a heading is no item of it. */}
      {props.captionHidden ? null : <Text variant="heading">{props.caption}</Text>}
      <View role="list" aria-label={props.caption} style={{ gap: 12 }}>
        {rows.map((row) => {
          const href = props.href?.(row) ?? null;
          const lines = (card.lines?.(row) ?? []).filter((line) => line !== null && line !== false);
          const face = (
            <Card pad={4}>
              <View style={{ flexDirection: "row", justifyContent: "space-between", gap: 12 }}>
                <View style={{ flexShrink: 1, minWidth: 0 }}>
                  {worded(card.title(row), "subhead")}
                </View>
                <View style={{ flexDirection: "row", alignItems: "center", gap: 6 }}>
                  {card.figure ? worded(card.figure(row), "figureS") : null}
                  {href ? <Icon name="right" size={18} /> : null}
                </View>
              </View>
              {lines.length > 0 ? (
                <View style={{ marginTop: 6, gap: 4 }}>
                  {lines.map((line, index) => (
                    <Fragment key={index}>{worded(line, "small")}</Fragment>
                  ))}
                </View>
              ) : null}
            </Card>
          );
          return (
            <View role="listitem" key={rowKey(row)}>
              {href ? (
                <Link href={href} asChild>
                  <Pressable role="link">{face}</Pressable>
                </Link>
              ) : props.onSelect ? (
                <Pressable role="button" onPress={() => props.onSelect?.(row)}>
                  {face}
                </Pressable>
              ) : (
                face
              )}
            </View>
          );
        })}
        {props.total && props.totalLabel ? (
          <View role="listitem">
            <Card pad={4}>
              <View style={{ flexDirection: "row", justifyContent: "space-between", gap: 12 }}>
                <Text variant="subhead" level="none">
                  {props.totalLabel}
                </Text>
                {card.figure ? (
                  worded(card.figure(props.total), "figureS")
                ) : (
                  <VisuallyHidden>—</VisuallyHidden>
                )}
              </View>
            </Card>
          </View>
        ) : null}
      </View>
    </View>
  );
}

/** Plain words get a face; elements bring their own. */
function worded(content: React.ReactNode, variant: "subhead" | "small" | "figureS") {
  if (typeof content !== "string" && typeof content !== "number") return content;
  return (
    <Text variant={variant} level="none" tone={variant === "small" ? "ink2" : "ink"}>
      {content}
    </Text>
  );
}
