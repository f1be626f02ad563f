import { useCallback, useState } from "react";
import type { LayoutChangeEvent } from "react-native";

import type { Span } from "./run-line";

/** Measured places of the members of a line along one axis; empty until laid out. */
export function useSpans(axis: "x" | "y"): {
  spans: ReadonlyMap<string, Span>;
  measure: (key: string) => (event: LayoutChangeEvent) => void;
} {
  const [spans, setSpans] = useState<ReadonlyMap<string, Span>>(new Map());
  const measure = useCallback(
    (key: string) => (event: LayoutChangeEvent) => {
      const { x, y, width, height } = event.nativeEvent.layout;
      const span = axis === "x" ? { start: x, end: x + width } : { start: y, end: y + height };
      setSpans((before) => {
        const known = before.get(key);
        if (known && known.start === span.start && known.end === span.end) return before;
        return new Map(before).set(key, span);
      });
    },
    [axis],
  );
  return { spans, measure };
}
