import type { ViewStyle } from "react-native";

/** Style only a browser knows (sticky, fixed, viewport heights), which React Native's types lack. */
export interface WebOnlyStyle {
  position?: "sticky" | "fixed" | "relative";
  top?: number | string;
  bottom?: number | string;
  left?: number | string;
  right?: number | string;
  height?: string;
  minHeight?: string;
  maxHeight?: string;
  width?: string;
  maxWidth?: string;
  overflow?: "auto";
  overflowX?: "auto" | "hidden";
  overflowY?: "auto" | "hidden";
  zIndex?: number;
  boxShadow?: string;
  cursor?: string;
  transition?: string;
  textDecorationThickness?: string;
  textUnderlineOffset?: string;
  outline?: "none";
  touchAction?: string;
  overflowWrap?: "anywhere";
  backgroundImage?: string;
  backgroundSize?: string;
  backgroundPosition?: string;
  pointerEvents?: "none";
  whiteSpace?: "nowrap" | "pre-wrap" | "pre";
}

/** The one place where browser-only style is handed to React Native. */
export function webStyle(style: WebOnlyStyle): ViewStyle {
  return style as unknown as ViewStyle;
}
