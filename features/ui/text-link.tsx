import { Link } from "expo-router";
import { Pressable, Text as NativeText } from "react-native";

import { typeScale, useTheme, webStyle, type TypeName } from "./theme";

interface LinkBase {
  label: string;
  said?: string;
  variant?: TypeName;
}
export type TextLinkProps = LinkBase &
  ({ href: string; onPress?: undefined } | { onPress: () => void; href?: undefined });

/** Smallest height a finger or a pointer is given, px; WCAG 2.2, 2.5.8. */
const LEAST_TARGET = 24;

/** Words that go somewhere, underlined in marking blue. */
export function TextLink(props: TextLinkProps) {
  const { colour } = useTheme();
  const { lineHeight } = typeScale[props.variant ?? "subhead"];
  const target = { paddingVertical: Math.max(0, (LEAST_TARGET - lineHeight) / 2) };
  const face = [
    typeScale[props.variant ?? "subhead"],
    {
      color: colour.mark,
      fontFamily: typeScale.subhead.fontFamily,
      textDecorationLine: "underline" as const,
      textDecorationColor: colour.mark,
    },
    webStyle({ textDecorationThickness: "1.5px", textUnderlineOffset: "3px" }),
  ];
  if (props.href !== undefined) {
    return (
      <Link href={props.href} style={[...face, target]} aria-label={props.said}>
        {props.label}
      </Link>
    );
  }
  return (
    <Pressable
      role="button"
      aria-label={props.said}
      onPress={props.onPress}
      hitSlop={12}
      style={target}
    >
      <NativeText style={face}>{props.label}</NativeText>
    </Pressable>
  );
}
