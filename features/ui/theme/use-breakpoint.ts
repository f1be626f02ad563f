import { useWindowDimensions } from "react-native";

import { breakpoint } from "./measures";

export type Breakpoint = "phone" | "tablet" | "wide";

/** Phone under 720 px, wide from 1120. Screens add columns when wide, never functions. */
export function useBreakpoint(): Breakpoint {
  const { width } = useWindowDimensions();
  if (width < breakpoint.tablet) return "phone";
  return width < breakpoint.wide ? "tablet" : "wide";
}
