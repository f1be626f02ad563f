import { useMemo } from "react";

import type { Interval } from "@shared/domain/time/interval";
import { NO_BREAK_SPACE, useWords, type Format } from "@features/i18n";

import { plotWidth, type ChartLayout } from "./chart-layout";
import { columnAt, type ChartSeries } from "./chart-series";
import { pixelOf, type ValueAxis } from "./value-axis";

/** What stands under the cursor, in the units shown; null is "no reading". */
export interface CursorReading {
  readonly atMs: number;
  readonly startMs: number;
  readonly supply: number | null;
  readonly return: number | null;
  readonly flow: number | null;
  /** kW, heating positive. */
  readonly powerKw: number | null;
}

export function cursorReading(series: ChartSeries, column: number): CursorReading {
  const value = (values: Float64Array) => {
    const found = values[column];
    return found === undefined || Number.isNaN(found) ? null : found;
  };
  return {
    atMs: columnAt(series, column),
    startMs: series.startMs[column] ?? NaN,
    supply: value(series.supply),
    return: value(series.return),
    flow: value(series.flow),
    powerKw: value(series.powerKw),
  };
}

export function cursorPlace(
  reading: CursorReading,
  frame: {
    view: Interval;
    layout: ChartLayout;
    /** Of the upper panel. */
    axis: ValueAxis;
    /** Values of the curves in the upper panel, in the units of its axis. */
    values: readonly (number | null)[];
  },
): { x: number; marks: readonly (number | null)[] } {
  const { view, layout, axis, values } = frame;
  const share = (reading.atMs - view.startMs) / (view.endMs - view.startMs);
  const { top, bottom } = layout.temperature;
  const y = (value: number | null) => (value === null ? null : pixelOf(value, axis, top, bottom));
  return {
    x: Math.min(layout.right, Math.max(layout.left, layout.left + share * plotWidth(layout))),
    marks: values.map(y),
  };
}

/** The reading in words: short on the chart, long for screen readers. */
export function useCursorText(
  reading: CursorReading | null,
  format: Format,
  roomy: boolean,
): { short: string; long: string } | null {
  const t = useWords("charts");
  return useMemo(() => {
    if (!reading) return null;
    const gap = NO_BREAK_SPACE.repeat(roomy ? 4 : 2);
    const date = format.date(reading.startMs);
    const when = `${roomy ? date : date.split(" ").slice(0, 2).join(" ")}, ${format.time(reading.startMs)}`;
    const { supply, return: back, flow, powerKw } = reading;
    const power =
      powerKw === null
        ? ""
        : format.withUnit(Math.abs(powerKw), powerKw < 0 ? "coolingPower" : "heatingPower");
    const dry = supply === null && back === null && flow === null;
    if (dry && power !== "")
      return { short: `${when}${gap}${power}`, long: t("powerReading", { when, power }) };
    if (dry) return { short: `${when}${gap}${t("nothing")}`, long: `${when}: ${t("nothing")}` };
    const unit = format.unit("temperatureDifference").unit;
    const number = (value: number | null, places: number) => format.number(value, places);
    const difference = supply === null || back === null ? null : Math.abs(supply - back);
    const deltaT = `ΔT${NO_BREAK_SPACE}${number(difference, 2)}${NO_BREAK_SPACE}${unit}`;
    const flowText = `${number(flow, 1)}${NO_BREAK_SPACE}${format.unit("flow").unit}`;
    const parts = [when, deltaT, flowText, power].filter((part) => part !== "");
    const temperature = format.unit("temperature").unit;
    return {
      short: parts.join(gap),
      long: t("reading", {
        when,
        supply: `${number(supply, 2)} ${temperature}`,
        return: `${number(back, 2)} ${temperature}`,
        deltaT: `${number(difference, 2)} ${unit}`,
        flow: flowText,
        power: power === "" ? t("noPower") : power,
      }),
    };
  }, [reading, format, roomy, t]);
}
