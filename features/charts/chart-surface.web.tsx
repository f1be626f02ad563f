import { useEffect, useRef, type KeyboardEvent, type PointerEvent } from "react";

import { shareOf, wheelFactor, type ChartGestures } from "./chart-gestures";
import type { ChartSurfaceProps } from "./chart-surface-props";

/** The part of a chart that takes keys, mouse and touch; in a browser. */
export function ChartSurface(props: ChartSurfaceProps) {
  const { gestures } = props;
  const box = useRef<HTMLDivElement>(null);
  const latest = useLatest(gestures);
  const pointers = usePointers(latest);
  useWheel(box, latest);

  function onKeyDown(event: KeyboardEvent<HTMLDivElement>) {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (gestures.onKey(event.key, event.shiftKey)) event.preventDefault();
  }
  return (
    <div
      ref={box}
      role="group"
      tabIndex={0}
      aria-label={props.label}
      aria-describedby={props.describedBy}
      onKeyDown={onKeyDown}
      onFocus={() => gestures.onFocusChange(true)}
      onBlur={() => gestures.onFocusChange(false)}
      {...pointers}
      style={{
        position: "relative",
        height: props.height,
        // Up and down scrolls the page; left and right, and two fingers, are the chart's.
        touchAction: "pan-y",
        userSelect: "none",
        cursor: gestures.canPan ? "grab" : "crosshair",
        borderRadius: 6,
      }}
    >
      {props.children}
    </div>
  );
}

/** Listeners that live long read the newest callbacks from here. */
function useLatest(gestures: ChartGestures) {
  const latest = useRef(gestures);
  useEffect(() => {
    latest.current = gestures;
  });
  return latest;
}

function usePointers(latest: { readonly current: ChartGestures }) {
  const held = useRef(new Map<number, number>());
  const at = (event: PointerEvent<HTMLDivElement>) =>
    event.clientX - event.currentTarget.getBoundingClientRect().left;
  const two = () => {
    const [a, b] = [...held.current.values()];
    if (a === undefined || b === undefined) return null;
    return [shareOf(a, latest.current), shareOf(b, latest.current)] as const;
  };
  const release = (event: PointerEvent<HTMLDivElement>) => {
    held.current.delete(event.pointerId);
  };
  return {
    onPointerDown(event: PointerEvent<HTMLDivElement>) {
      if (event.pointerType === "mouse" && event.button !== 0) return;
      held.current.set(event.pointerId, at(event));
      if (typeof event.currentTarget.setPointerCapture === "function")
        event.currentTarget.setPointerCapture(event.pointerId);
      const pair = two();
      if (pair) latest.current.onPinch("start", ...pair);
      else latest.current.onPoint(shareOf(at(event), latest.current));
    },
    onPointerMove(event: PointerEvent<HTMLDivElement>) {
      const x = at(event);
      const before = held.current.get(event.pointerId);
      const { current } = latest;
      if (before === undefined) {
        if (event.pointerType === "mouse") current.onPoint(shareOf(x, current));
        return;
      }
      held.current.set(event.pointerId, x);
      const pair = two();
      if (pair) current.onPinch("move", ...pair);
      else if (current.canPan) current.onPan((before - x) / Math.max(1, current.plotWidth));
      else current.onPoint(shareOf(x, current));
    },
    onPointerUp: release,
    onPointerCancel: release,
    onPointerLeave(event: PointerEvent<HTMLDivElement>) {
      if (event.pointerType === "mouse" && !held.current.has(event.pointerId))
        latest.current.onLeave();
    },
  };
}

/**
 * The wheel zooms once the mouse has moved over the chart since the page last scrolled: somebody who
 * scrolls past a chart keeps scrolling. Showing everything already, a wheel outwards scrolls too.
 */
function useWheel(
  box: { readonly current: HTMLDivElement | null },
  latest: { readonly current: ChartGestures },
) {
  useEffect(() => {
    const element = box.current;
    if (!element) return;
    let meant = false;
    const onMove = () => {
      meant = true;
    };
    const onScroll = () => {
      meant = false;
    };
    const onWheel = (event: WheelEvent) => {
      const { current } = latest;
      const sideways = Math.abs(event.deltaX) > Math.abs(event.deltaY);
      if (sideways && current.canPan) {
        event.preventDefault();
        current.onPan(event.deltaX / Math.max(1, current.plotWidth));
        return;
      }
      const outwards = event.deltaY > 0;
      if (!(meant || event.ctrlKey) || (outwards && !current.canPan)) return;
      event.preventDefault();
      const x = event.clientX - element.getBoundingClientRect().left;
      current.onZoom(wheelFactor(event.deltaY, event.deltaMode), shareOf(x, current));
    };
    element.addEventListener("pointermove", onMove);
    element.addEventListener("wheel", onWheel, { passive: false });
    document.addEventListener("scroll", onScroll, { capture: true, passive: true });
    return () => {
      element.removeEventListener("pointermove", onMove);
      element.removeEventListener("wheel", onWheel);
      document.removeEventListener("scroll", onScroll, { capture: true });
    };
  }, [box, latest]);
}
