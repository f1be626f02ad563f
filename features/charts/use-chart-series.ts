import { useCallback, useEffect, useMemo, useRef, useState } from "react";

import type { SeriesAnswer } from "@shared/contracts/energy";
import type { Interval } from "@shared/domain/time/interval";

import { chartSeries, type ChartSeries, type ChartUnits } from "./chart-series";
import { clampView } from "./view-window";

/** Fetches what `pixels` can draw of a stretch of time. */
export type LoadSeries = (
  window: Interval,
  pixels: number,
  signal: AbortSignal,
) => Promise<SeriesAnswer>;

export interface LoadedSeries {
  /** The whole range, coarse; null until it has come. */
  readonly overview: ChartSeries | null;
  /** The finest that covers the view. */
  readonly shown: ChartSeries | null;
  /** Over everything fetched so far, so that an axis only ever grows. */
  readonly temperatureExtent: readonly [number, number] | null;
  readonly flowExtent: readonly [number, number] | null;
  readonly failed: boolean;
  readonly retry: () => void;
}

interface Wish {
  readonly range: Interval;
  readonly view: Interval;
  /** Columns the plot has room for, times two. */
  readonly pixels: number;
  readonly units: ChartUnits;
  readonly load: LoadSeries;
}

const mostPixels = 4000;
const mostKept = 16;
/** A hand still turning the wheel must not ask for every picture on the way. */
const restMs = 140;
/** Columns this much wider than the best possible are still fine enough. */
const goodEnough = 1.6;

/**
 * Keeps what has been fetched of a range and fetches what the view lacks, with half a view more on
 * each side so that a drag finds its picture ready. The coarser picture stays until a finer comes.
 */
export function useChartSeries({ range, view, pixels, units, load }: Wish): LoadedSeries {
  const [answers, setAnswers] = useState<readonly SeriesAnswer[]>([]);
  const [failed, setFailed] = useState(false);
  const [attempt, setAttempt] = useState(0);
  const latestLoad = useRef(load);
  useEffect(() => {
    latestLoad.current = load;
  });

  const fetchInto = useCallback((window: Interval, px: number) => {
    const abort = new AbortController();
    latestLoad
      .current(window, Math.max(50, Math.min(mostPixels, Math.round(px))), abort.signal)
      .then(
        (answer) => {
          if (abort.signal.aborted) return;
          setFailed(false);
          // The overview, first of all, is never dropped.
          setAnswers((kept) => [...kept.slice(0, 1), ...kept.slice(1).slice(1 - mostKept), answer]);
        },
        () => {
          if (!abort.signal.aborted) setFailed(true);
        },
      );
    return () => abort.abort();
  }, []);

  useEffect(
    () => (pixels > 0 ? fetchInto(range, pixels) : undefined),
    [fetchInto, range, pixels, attempt],
  );

  const series = useMemo(
    () => answers.map((answer) => chartSeries(answer, units)),
    [answers, units],
  );
  const overview = series[0] ?? null;
  const shown = finest(series, view) ?? overview;
  const lacking = overview !== null && shown !== null && lacks(shown, view, pixels);
  const { startMs, endMs } = view;
  useEffect(() => {
    if (!lacking) return;
    const half = (endMs - startMs) / 2;
    const window = clampView(
      { startMs: Math.floor(startMs - half), endMs: Math.ceil(endMs + half) },
      { range, leastMs: 1 },
    );
    const px = (pixels * (window.endMs - window.startMs)) / (endMs - startMs);
    let cancel: (() => void) | undefined;
    const timer = setTimeout(() => {
      cancel = fetchInto(window, px);
    }, restMs);
    return () => {
      clearTimeout(timer);
      cancel?.();
    };
  }, [lacking, startMs, endMs, pixels, range, fetchInto, attempt]);

  const retry = useCallback(() => {
    setFailed(false);
    setAttempt((count) => count + 1);
  }, []);
  return {
    overview,
    shown,
    temperatureExtent: widest(series.map((one) => one.temperatureExtent)),
    flowExtent: widest(series.map((one) => one.flowExtent)),
    failed,
    retry,
  };
}

function widest(
  extents: readonly (readonly [number, number] | null)[],
): readonly [number, number] | null {
  return extents.reduce((all, one) => {
    if (all === null || one === null) return all ?? one;
    return [Math.min(all[0], one[0]), Math.max(all[1], one[1])];
  }, null);
}

function covers({ range }: ChartSeries, view: Interval): boolean {
  return range.startMs <= view.startMs && range.endMs >= view.endMs;
}

/** Seconds of a column; rows are finer than any mean. */
const fineness = ({ averagedOverS }: ChartSeries) => averagedOverS ?? 0;

export function finest(series: readonly ChartSeries[], view: Interval): ChartSeries | null {
  return series
    .filter((one) => covers(one, view))
    .reduce<ChartSeries | null>(
      (best, one) => (best === null || fineness(one) < fineness(best) ? one : best),
      null,
    );
}

/** Whether a finer picture of the view could be had. */
export function lacks(shown: ChartSeries, view: Interval, pixels: number): boolean {
  if (!covers(shown, view)) return true;
  if (shown.averagedOverS === null) return false;
  const possibleMs = (view.endMs - view.startMs) / (pixels / 2);
  const rowMs = (shown.nominalStepS ?? 0) * 1000;
  return shown.averagedOverS * 1000 > Math.max(possibleMs, rowMs) * goodEnough;
}
