import { useEffect, useRef, useState } from "react";
import { View } from "react-native";

import { layout, stroke, useBreakpoint, useTheme, webStyle } from "./theme";

/**
 * A line from the foot of an open figure to the workings at the right edge. It must stand inside the
 * figure, whose place it is measured from.
 */
export function MarkLine() {
  const { colour } = useTheme();
  const wide = useBreakpoint() === "wide";
  const line = useRef<View>(null);
  const [width, setWidth] = useState(0);
  useEffect(() => {
    if (!wide) return;
    const measure = () => {
      const element = line.current as unknown;
      if (!(element instanceof HTMLElement)) return;
      const { left } = element.getBoundingClientRect();
      const panel = document.documentElement.clientWidth - layout.wide.workings;
      setWidth(Math.max(0, panel - left));
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(document.body);
    return () => observer.disconnect();
  }, [wide]);
  if (!wide) return null;
  return (
    <View
      ref={line}
      aria-hidden
      style={[
        { position: "absolute", left: 0, bottom: -4, height: 2, width, zIndex: 5 },
        { backgroundColor: colour.mark, borderRadius: stroke.hair },
        webStyle({ pointerEvents: "none" }),
      ]}
    />
  );
}
