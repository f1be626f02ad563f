import { useRef } from "react";
import { View, type GestureResponderEvent } from "react-native";

import { shareOf } from "./chart-gestures";
import type { ChartSurfaceProps } from "./chart-surface-props";

/** The part of a chart that takes touch; on a device without a browser. */
export function ChartSurface({ label, height, gestures, children }: ChartSurfaceProps) {
  const before = useRef<number | null>(null);
  const places = (event: GestureResponderEvent) =>
    event.nativeEvent.touches.map((touch) => shareOf(touch.locationX, gestures));
  function onMove(event: GestureResponderEvent) {
    const [a, b] = places(event);
    if (a === undefined) return;
    if (b !== undefined) gestures.onPinch("move", a, b);
    else if (gestures.canPan && before.current !== null) gestures.onPan(before.current - a);
    else gestures.onPoint(a);
    before.current = a;
  }
  return (
    <View
      aria-label={label}
      style={{ height }}
      onStartShouldSetResponder={() => true}
      onResponderGrant={(event) => {
        const [a, b] = places(event);
        before.current = a ?? null;
        if (a === undefined) return;
        if (b === undefined) gestures.onPoint(a);
        else gestures.onPinch("start", a, b);
      }}
      onResponderMove={onMove}
      onResponderRelease={() => {
        before.current = null;
      }}
    >
      {children}
    </View>
  );
}
