import { useCallback, useMemo, useRef, useState } from "react";

import { DAY_MS, type Interval } from "@shared/domain/time/interval";

import { columnAt, endColumn, nearestColumn, stepColumn, type ChartSeries } from "./chart-series";
import {
  clampView,
  isWholeRange,
  panView,
  pinchView,
  revealInView,
  zoomView,
  type ViewBounds,
} from "./view-window";

export interface ChartView {
  readonly view: Interval;
  readonly whole: boolean;
  readonly cursorMs: number | null;
  readonly showAll: () => void;
  readonly moveTo: (share: number) => void;
  readonly clearCursor: () => void;
  readonly pan: (share: number) => void;
  readonly zoom: (factor: number, share: number) => void;
  readonly pinch: (phase: "start" | "move", a: number, b: number) => void;
  /** True where the key was of use. */
  readonly key: (key: string, shift: boolean, series: ChartSeries | null) => boolean;
}

const keyZoom = 0.6;
const keyPan = 0.2;

/** Which part of its range a chart shows and where its cursor stands. */
export function useChartView(range: Interval, leastMs: number): ChartView {
  const bounds: ViewBounds = useMemo(() => ({ range, leastMs }), [range, leastMs]);
  const [wanted, setView] = useState<Interval>(range);
  const [cursorMs, setCursor] = useState<number | null>(null);
  const pinched = useRef<{ aMs: number; bMs: number } | null>(null);
  const view = useMemo(() => clampView(wanted, bounds), [wanted, bounds]);
  const at = useCallback(
    (share: number) => view.startMs + share * (view.endMs - view.startMs),
    [view.startMs, view.endMs],
  );
  const zoom = (factor: number, share: number) =>
    setView(zoomView(view, factor, at(share), bounds));
  const pan = (share: number) =>
    setView((before) => {
      const held = clampView(before, bounds);
      return panView(held, share * (held.endMs - held.startMs), bounds);
    });
  const toInstant = (ms: number) => {
    setCursor(ms);
    setView((before) => revealInView(clampView(before, bounds), ms, bounds));
  };

  function moveByKey(key: string, series: ChartSeries): boolean {
    const from = cursorMs === null ? null : nearestColumn(series, cursorMs);
    const target = (): number | null => {
      switch (key) {
        case "Home":
          return endColumn(series, "first");
        case "End":
          return endColumn(series, "last");
        case "ArrowLeft":
          return from === null ? endColumn(series, "last") : stepColumn(series, from, -1);
        case "ArrowRight":
          return from === null ? endColumn(series, "first") : stepColumn(series, from, 1);
        case "PageUp":
          return nearestColumn(series, (cursorMs ?? view.endMs) - DAY_MS);
        case "PageDown":
          return nearestColumn(series, (cursorMs ?? view.startMs) + DAY_MS);
        default:
          return null;
      }
    };
    const column = target();
    if (column === null) return false;
    toInstant(columnAt(series, column));
    return true;
  }

  return {
    view,
    whole: isWholeRange(view, range),
    cursorMs,
    showAll: () => setView(range),
    moveTo: (share) => setCursor(at(share)),
    clearCursor: () => setCursor(null),
    pan,
    zoom,
    pinch(phase, a, b) {
      if (phase === "start") pinched.current = { aMs: at(a), bMs: at(b) };
      else if (pinched.current) {
        const next = pinchView(pinched.current, a, b, bounds);
        if (next) setView(next);
      }
    },
    key(key, shift, series) {
      const share = ((cursorMs ?? at(0.5)) - view.startMs) / (view.endMs - view.startMs);
      const middle = Math.min(1, Math.max(0, share));
      if (key === "+" || key === "=") zoom(keyZoom, middle);
      else if (key === "-" || key === "−" || key === "_") zoom(1 / keyZoom, middle);
      else if (key === "0") setView(range);
      else if (key === "Escape" && cursorMs !== null) setCursor(null);
      else if (shift && key === "ArrowLeft") pan(-keyPan);
      else if (shift && key === "ArrowRight") pan(keyPan);
      else return series !== null && moveByKey(key, series);
      return true;
    },
  };
}
