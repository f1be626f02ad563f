import type { ReactNode } from "react";
import { Text as NativeText, type StyleProp, type TextStyle } from "react-native";

import { typeScale, useBreakpoint, useTheme, type ColourRole, type TypeName } from "./theme";

export interface TextProps {
  variant?: TypeName;
  tone?: ColourRole;
  /** Makes it a heading of this level; display, title, heading and subhead have one by default. */
  level?: 1 | 2 | 3 | 4 | "none";
  align?: "left" | "center" | "right";
  numberOfLines?: number;
  /** Keeps codes such as CHW-1B in one piece. */
  noWrap?: boolean;
  id?: string;
  role?: "status" | "alert";
  hidden?: boolean;
  style?: StyleProp<TextStyle>;
  children: ReactNode;
}

const defaultLevel: Partial<Record<TypeName, 1 | 2 | 3>> = {
  display: 1,
  title: 1,
  heading: 2,
  subhead: 3,
};

/** All words on screen. Sizes and faces come from the type scale, colours from the theme. */
export function Text(props: TextProps) {
  const { variant = "body", tone = "ink", align, noWrap, style, children, hidden } = props;
  const { colour } = useTheme();
  const wide = useBreakpoint() !== "phone";
  const face = typeScale[variant === "body" && wide ? "bodyWide" : variant];
  const level = props.level ?? defaultLevel[variant] ?? "none";
  const heading =
    level === "none" ? { role: props.role } : { role: "heading" as const, "aria-level": level };
  return (
    <NativeText
      {...heading}
      id={props.id}
      aria-hidden={hidden}
      numberOfLines={noWrap ? 1 : props.numberOfLines}
      style={[face, { color: colour[tone] }, align ? { textAlign: align } : null, style]}
    >
      {children}
    </NativeText>
  );
}

/** Bold words inside a Text; size and colour come from the words around it. */
export function Strong({ children }: { children: ReactNode }) {
  return <NativeText style={{ fontFamily: typeScale.subhead.fontFamily }}>{children}</NativeText>;
}

/** A run of words in another face inside a Text: as-read values (mono) or units (narrow). */
export function Inline(props: { variant: TypeName; tone?: ColourRole; children: ReactNode }) {
  const { colour } = useTheme();
  const tone = props.tone ? { color: colour[props.tone] } : null;
  return <NativeText style={[typeScale[props.variant], tone]}>{props.children}</NativeText>;
}
