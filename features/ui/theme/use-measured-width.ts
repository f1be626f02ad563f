import { useCallback, useState } from "react";
import type { LayoutChangeEvent } from "react-native";

/** Width of a view in px, 0 until it has been laid out; drawings wait for it rather than guess. */
export function useMeasuredWidth(): [number, (event: LayoutChangeEvent) => void] {
  const [width, setWidth] = useState(0);
  const onLayout = useCallback((event: LayoutChangeEvent) => {
    setWidth(Math.round(event.nativeEvent.layout.width));
  }, []);
  return [width, onLayout];
}
