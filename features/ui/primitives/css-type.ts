import type { CSSProperties } from "react";
import type { TextStyle } from "react-native";

/** A step of the type scale as CSS, for the few real HTML elements of the kit. */
export function cssType(face: TextStyle): CSSProperties {
  return {
    fontFamily: face.fontFamily,
    fontSize: face.fontSize,
    lineHeight: face.lineHeight === undefined ? undefined : `${face.lineHeight}px`,
    letterSpacing: typeof face.letterSpacing === "number" ? face.letterSpacing : undefined,
    fontVariantNumeric: "tabular-nums",
    fontWeight: "normal",
  };
}
