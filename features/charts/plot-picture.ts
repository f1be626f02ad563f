import type { Interval } from "@shared/domain/time/interval";

import { plotWidth, type ChartLayout } from "./chart-layout";
import { columnAt, visibleColumns, type ChartSeries } from "./chart-series";
import { pixelOf, type ValueAxis } from "./value-axis";

/** One place on a curve, px from the plot's top left; null lifts the pen. */
export interface PlotPoint {
  readonly x: number;
  readonly xValue: number;
  readonly y: number | null;
  readonly yValue: number | null;
}

export interface BandPoint extends PlotPoint {
  readonly y0: number | null;
}

export type Direction = "cooling" | "heating";

/** Everything the canvas draws, as pixels: it knows neither time nor units. */
export interface PlotPicture {
  readonly width: number;
  readonly height: number;
  readonly supply: Readonly<Record<Direction, readonly PlotPoint[]>>;
  readonly return: Readonly<Record<Direction, readonly PlotPoint[]>>;
  readonly band: Readonly<Record<Direction, readonly BandPoint[]>>;
  /** Least to greatest of each column, of supply and of return. */
  readonly envelopes: Readonly<Record<Direction, readonly (readonly BandPoint[])[]>>;
  readonly bars: readonly { x: number; y: number; width: number; height: number }[];
}

export interface PictureOptions {
  readonly series: ChartSeries;
  readonly view: Interval;
  readonly layout: ChartLayout;
  readonly temperature: ValueAxis;
  readonly flow: ValueAxis;
  /** On a changeover loop each column is cooling or heating by its own temperatures. */
  readonly service: "chilled" | "hot" | "changeover";
}

/** Share of a column that its bar takes. */
const BAR_SHARE = 0.72;

export function plotPicture(options: PictureOptions): PlotPicture {
  const { series, view, layout, temperature, flow, service } = options;
  const width = plotWidth(layout);
  const originY = layout.temperature.top;
  const pxPerMs = width / (view.endMs - view.startMs);
  const xOf = (ms: number) => (ms - view.startMs) * pxPerMs;
  const { top, bottom } = layout.temperature;
  const yOf = (value: number | undefined) =>
    value === undefined || Number.isNaN(value)
      ? null
      : pixelOf(value, temperature, top, bottom) - originY;
  const [from, to] = visibleColumns(series, view);

  function directionOf(column: number): Direction {
    if (service !== "changeover") return service === "hot" ? "heating" : "cooling";
    return (series.supply[column] ?? 0) > (series.return[column] ?? 0) ? "heating" : "cooling";
  }
  function curve(values: Float64Array, only: Direction): PlotPoint[] {
    return columns().map((i) => {
      const drawn = belongs(i, only);
      const y = drawn ? yOf(values[i]) : null;
      const at = columnAt(series, i);
      return { x: xOf(at), xValue: at, y, yValue: y === null ? null : (values[i] ?? null) };
    });
  }
  function columns(): number[] {
    return Array.from({ length: Math.max(0, to - from) }, (_, index) => from + index);
  }
  /** A column closes the run before it even where the direction changes, so no hole shows. */
  function belongs(i: number, only: Direction): boolean {
    return directionOf(i) === only || (i > from && directionOf(i - 1) === only);
  }
  function between(low: Float64Array, high: Float64Array, only: Direction): BandPoint[] {
    return curve(high, only).map((point, index) => {
      const y0 = yOf(low[from + index]);
      const whole = point.y !== null && y0 !== null;
      return { ...point, y: whole ? point.y : null, y0: whole ? y0 : null };
    });
  }
  const both = <T>(make: (direction: Direction) => T[]): Record<Direction, T[]> => ({
    cooling: service === "hot" ? [] : make("cooling"),
    heating: service === "chilled" ? [] : make("heating"),
  });
  const { envelope } = series;
  return {
    width,
    height: layout.flow.bottom - originY,
    supply: both((direction) => curve(series.supply, direction)),
    return: both((direction) => curve(series.return, direction)),
    band: both((direction) => between(series.supply, series.return, direction)),
    envelopes: both((direction) =>
      envelope === null
        ? []
        : [
            between(envelope.supplyLeast, envelope.supplyGreatest, direction),
            between(envelope.returnLeast, envelope.returnGreatest, direction),
          ],
    ),
    bars: columns().flatMap((i) => {
      const value = series.flow[i] ?? NaN;
      if (Number.isNaN(value)) return [];
      const zero = pixelOf(0, flow, layout.flow.top, layout.flow.bottom) - originY;
      const end = pixelOf(value, flow, layout.flow.top, layout.flow.bottom) - originY;
      const column = ((series.endMs[i] ?? NaN) - (series.startMs[i] ?? NaN)) * pxPerMs;
      const bar = Math.max(0.75, column * BAR_SHARE);
      const x = xOf(series.startMs[i] ?? NaN) + (column - bar) / 2;
      return [{ x, y: Math.min(zero, end), width: bar, height: Math.abs(end - zero) }];
    }),
  };
}
