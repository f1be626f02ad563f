import { useEffect } from "react";

import { prefetchCharts } from "./plot-door";

/** Long enough for the first page's own requests to be answered. */
const quietMs = 2500;

/** Fetches the drawing part once the page is idle, for those who will see a chart. */
export function usePrefetchCharts(wanted: boolean): void {
  useEffect(() => {
    if (!wanted) return;
    let idle: number | undefined;
    const timer = setTimeout(() => {
      if (typeof requestIdleCallback === "function") idle = requestIdleCallback(prefetchCharts);
      else prefetchCharts();
    }, quietMs);
    return () => {
      clearTimeout(timer);
      if (idle !== undefined) cancelIdleCallback(idle);
    };
  }, [wanted]);
}
