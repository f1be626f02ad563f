import { localDateOf } from "@shared/domain/time/local-calendar";
import type { Interval } from "@shared/domain/time/interval";
import { formatFigure, formatNumber, type Format } from "@features/i18n";

import { columnEnergy, columnExpandedKwh, type ChartDay } from "./chart-days";
import { plotWidth, type ChartLayout } from "./chart-layout";
import { timeAxis, weekOf, type TimeColumn } from "./time-columns";

/** A name under the plot with the line it belongs to. */
export interface ColumnLabel {
  readonly kind: "hour" | "column";
  readonly lineMs: number;
  /** The part of the column that the view shows. */
  readonly fromMs: number;
  readonly toMs: number;
  readonly name: string;
  readonly faint: string;
  /** In the unit shown, one a register; empty where there is no room. */
  readonly energies: readonly (number | null)[];
  readonly energyPlaces: number;
  /** The ± of each energy in the unit shown; null where there is none or no room for it. */
  readonly uncertainties: readonly (number | null)[];
}

export interface LabelOptions {
  readonly view: Interval;
  readonly zone: string;
  readonly layout: ChartLayout;
  readonly days: readonly ChartDay[];
  readonly registers: readonly ("heating" | "cooling")[];
  readonly format: Format;
  /** "Week 20". */
  readonly weekName: (week: number) => string;
}

/** Rough widths of a digit of a figure and of a letter of a name, px. */
const digitPx = 8.2;
const letterPx = 7;
/** A day this wide stands nearly alone: its month is no longer plain from its neighbours. */
const loneDayPx = 220;

export function columnLabels(options: LabelOptions): ColumnLabel[] {
  const { view, zone, layout, registers, format, days } = options;
  const width = plotWidth(layout);
  const axis = timeAxis(view, zone, width);
  const pxOf = (fromMs: number, toMs: number) =>
    ((toMs - fromMs) / (view.endMs - view.startMs)) * width;
  const values = axis.columns.map((column) => energiesOf(column, options));
  const greatest = Math.max(0, ...values.flat().map((value) => value ?? 0));
  const places = greatest >= 100 ? 0 : greatest >= 10 ? 1 : 2;
  const written = axis.columns.map((column, index) => withRoom(column, values[index] ?? []));
  // All of them or none: a row of figures reads as one.
  const hasRoom = written.every(({ fits }) => fits);
  const columns = axis.columns.map((column, index): ColumnLabel => {
    const fromMs = Math.max(column.startMs, view.startMs);
    const toMs = Math.min(column.endMs, view.endMs);
    const room = pxOf(fromMs, toMs);
    const fits = (text: string) => text.length * digitPx < room;
    const energies = values[index] ?? [];
    const plain = energies.map((value) => formatNumber(value, places, format.language));
    return {
      kind: "column",
      lineMs: fromMs,
      fromMs,
      toMs,
      ...nameOf(column, room, options),
      energies:
        layout.energyBaselines.length > 0 && days.length > 0 && plain.every(fits) ? energies : [],
      energyPlaces: places,
      uncertainties: hasRoom ? (written[index]?.known ?? []) : [],
    };
  });
  const hours = axis.hours.map((atMs): ColumnLabel => ({
    kind: "hour",
    lineMs: atMs,
    fromMs: atMs,
    toMs: atMs,
    name: nearName(columns, atMs, pxOf) ? "" : format.time(atMs),
    faint: "",
    energies: [],
    energyPlaces: 0,
    uncertainties: [],
  }));
  return [...columns, ...hours];
  /** The ± of a column's energies, and whether both stand side by side in a whole column. */
  function withRoom(column: TimeColumn, energies: readonly (number | null)[]) {
    const known = registers.map((register) => {
      const kwh = columnExpandedKwh(column, days, register);
      const quantity = register === "heating" ? "heatingEnergy" : "coolingEnergy";
      return kwh === null ? null : kwh * format.unit(quantity).factor;
    });
    const room = pxOf(column.startMs, column.endMs);
    const fits = energies.every((value, row) => {
      const text = formatFigure(value, known[row] ?? null, format.language);
      const both = text.uncertainty === null ? text.value : `${text.value} ±${text.uncertainty}`;
      return both.length * digitPx < room;
    });
    return { known, fits };
  }
  function energiesOf(column: TimeColumn, { format: as }: LabelOptions) {
    const endDate = localDateOf(column.endMs, zone);
    return registers.map((register) => {
      const kwh = columnEnergy(column, endDate, days, register);
      const quantity = register === "heating" ? "heatingEnergy" : "coolingEnergy";
      return kwh === null ? null : as.toDisplay(kwh, quantity);
    });
  }
}

/** An hour whose name would run into the day's, which stands in the middle of its column. */
function nearName(
  columns: readonly ColumnLabel[],
  atMs: number,
  pxOf: (fromMs: number, toMs: number) => number,
): boolean {
  return columns.some((column) => {
    const middle = (column.fromMs + column.toMs) / 2;
    const half = ((column.name.length + column.faint.length) * letterPx) / 2;
    return column.name !== "" && Math.abs(pxOf(middle, atMs)) < half + 22;
  });
}

/** The fullest name that fits: "Mon 11", "Mon"; "Week 20", "20"; "May 2026", "May". */
function nameOf(
  column: TimeColumn,
  room: number,
  { format, weekName }: LabelOptions,
): { name: string; faint: string } {
  const { date, unit } = column;
  const day = String(Number(date.slice(8)));
  const full = (name: string, faint: string) =>
    (name.length + faint.length + 1) * letterPx + 10 < room ? { name, faint } : null;
  const short = (name: string) =>
    name.length * letterPx < room + 6 ? { name, faint: "" } : { name: "", faint: "" };
  switch (unit) {
    case "day": {
      const weekday = format.day(date, "weekdayShort").replace(".", "");
      if (room > loneDayPx) return { name: weekday, faint: `${day} ${monthOnly(format, date)}` };
      return full(weekday, day) ?? short(weekday);
    }
    case "week":
      return full(weekName(weekOf(column)), "") ?? short(String(weekOf(column)));
    case "month":
      return full(format.day(date, "monthYear"), "") ?? short(monthOnly(format, date));
    case "year":
      return short(date.slice(0, 4));
  }
}

function monthOnly(format: Format, date: string): string {
  return format.day(date, "dayMonth").replace(/[\d.]/g, "").trim();
}
