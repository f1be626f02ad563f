import type { Interval } from "@shared/domain/time/interval";

import { plotWidth, type ChartLayout } from "./chart-layout";
import { columnAt, visibleColumns, type ChartSeries, type ChartUnits } from "./chart-series";
import type { BandPoint, Direction, PictureOptions, PlotPicture, PlotPoint } from "./plot-picture";
import { pixelOf, type ValueAxis } from "./value-axis";

export type PowerService = PictureOptions["service"];

/**
 * Power of each column in the unit shown, the loop's own register positive: what goes the other way
 * counts in no register and lies under zero. On a changeover loop both registers are positive.
 */
export function shownPower(
  { powerKw }: Pick<ChartSeries, "powerKw">,
  service: PowerService,
  units: ChartUnits,
): Float64Array {
  const heating = units.heatingPower.factor;
  const cooling = units.coolingPower.factor;
  return powerKw.map((kw) => {
    if (service === "hot") return kw * heating;
    if (service === "chilled") return -kw * cooling;
    return kw >= 0 ? kw * heating : -kw * cooling;
  });
}

/** Power alone over time, filled down to zero: of a permanent meter that gives no flow or ΔT. */
export function powerPicture(options: {
  readonly series: ChartSeries;
  /** As {@link shownPower} gives it. */
  readonly power: Float64Array;
  readonly view: Interval;
  readonly layout: ChartLayout;
  readonly axis: ValueAxis;
  readonly service: PowerService;
}): PlotPicture {
  const { series, power, view, layout, axis, service } = options;
  const { top, bottom } = layout.temperature;
  const width = plotWidth(layout);
  const pxPerMs = width / (view.endMs - view.startMs);
  const zero = pixelOf(0, axis, top, bottom) - top;
  const [from, to] = visibleColumns(series, view);
  const columns = Array.from({ length: Math.max(0, to - from) }, (_, index) => from + index);

  function directionOf(column: number): Direction {
    if (service !== "changeover") return service === "hot" ? "heating" : "cooling";
    return (series.powerKw[column] ?? 0) >= 0 ? "heating" : "cooling";
  }
  /** A column closes the run before it even where the direction changes, so no hole shows. */
  function belongs(i: number, only: Direction): boolean {
    return directionOf(i) === only || (i > from && directionOf(i - 1) === only);
  }
  function curve(only: Direction): PlotPoint[] {
    return columns.map((i) => {
      const at = columnAt(series, i);
      const value = power[i] ?? NaN;
      const drawn = belongs(i, only) && !Number.isNaN(value);
      const y = drawn ? pixelOf(value, axis, top, bottom) - top : null;
      return { x: (at - view.startMs) * pxPerMs, xValue: at, y, yValue: drawn ? value : null };
    });
  }
  const band = (only: Direction): BandPoint[] =>
    curve(only).map((point) => ({ ...point, y0: point.y === null ? null : zero }));
  const both = <T>(make: (direction: Direction) => T[]): Record<Direction, T[]> => ({
    cooling: service === "hot" ? [] : make("cooling"),
    heating: service === "chilled" ? [] : make("heating"),
  });
  const none = { cooling: [], heating: [] };
  return {
    width,
    height: layout.flow.bottom - top,
    supply: both(curve),
    return: none,
    band: both(band),
    envelopes: none,
    bars: [],
  };
}
