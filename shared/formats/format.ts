import {
  displayUnits,
  fromDisplay,
  toDisplay,
  type DisplayUnit,
  type Quantity,
  type UnitSystem,
} from "../domain/units/display-units";
import { localDateOf } from "../domain/time/local-calendar";
import { dayInstant, formatDate, formatTime, needsYear, type DateStyle } from "./dates";
import type { Language } from "./language";
import { formatFigure, formatNumber, NO_BREAK_SPACE, sensiblePlaces } from "./numbers";

export interface Format {
  readonly language: Language;
  readonly unitSystem: UnitSystem;
  /** Thousands, decimal mark and minus of the language; `places` left out picks sensible ones. */
  readonly number: (value: number | null, places?: number) => string;
  /** The value as shown in the account's unit, “18.42 m³/h”, with a no-break space. */
  readonly withUnit: (stored: number | null, quantity: Quantity, places?: number) => string;
  readonly unit: (quantity: Quantity) => DisplayUnit;
  readonly toDisplay: (stored: number, quantity: Quantity) => number;
  readonly fromDisplay: (typed: number, quantity: Quantity) => number;
  /** “14,940 ± 500 kWh” as text, from stored value and ±. */
  readonly figure: (
    stored: number | null,
    uncertainty: number | null,
    quantity: Quantity,
    places?: number,
  ) => string;
  /** A weekday's date carries its year where that is not this year at the site. */
  readonly date: (ms: number, style?: DateStyle) => string;
  readonly time: (ms: number, seconds?: boolean) => string;
  readonly dateTime: (ms: number) => string;
  /** A calendar day YYYY-MM-DD, whatever the zone. */
  readonly day: (isoDay: string, style?: DateStyle) => string;
  /** “45 s”, “12 min”, “3 h 20 min”, “5 d”. */
  readonly duration: (seconds: number) => string;
  readonly bytes: (count: number) => string;
}

/**
 * How values are written in a language, a unit system and a zone: on screens and on the pages the
 * server prints.
 * @param today the site's day, YYYY-MM-DD: dates of another year are then written with it.
 */
export function makeFormat(
  language: Language,
  unitSystem: UnitSystem,
  zone: string,
  today: string | null = null,
): Format {
  const units = displayUnits(unitSystem);
  const number = (value: number | null, places?: number) =>
    formatNumber(value, places ?? sensiblePlaces(value ?? 0), language);
  const join = (text: string, unit: string) => `${text}${NO_BREAK_SPACE}${unit}`;
  const styleOf = (style: DateStyle, isoDay: () => string): DateStyle =>
    style === "weekdayDay" && today !== null && needsYear(isoDay(), today)
      ? "weekdayDayYear"
      : style;
  const date = (ms: number, style: DateStyle = "weekdayDay") =>
    formatDate(
      ms,
      zone,
      language,
      styleOf(style, () => localDateOf(ms, zone)),
    );
  const time = (ms: number, seconds?: boolean) => formatTime(ms, zone, language, seconds);
  return {
    language,
    unitSystem,
    number,
    unit: (quantity) => units[quantity],
    toDisplay: (stored, quantity) => toDisplay(stored, units[quantity]),
    fromDisplay: (typed, quantity) => fromDisplay(typed, units[quantity]),
    withUnit: (stored, quantity, places) =>
      stored === null || Number.isNaN(stored)
        ? "—"
        : join(number(toDisplay(stored, units[quantity]), places), units[quantity].unit),
    figure: (stored, uncertainty, quantity, places) => {
      const unit = units[quantity];
      const text = formatFigure(
        stored === null ? null : toDisplay(stored, unit),
        uncertainty === null ? null : uncertainty * unit.factor,
        language,
        places,
      );
      const both = text.uncertainty === null ? text.value : `${text.value} ± ${text.uncertainty}`;
      return stored === null ? both : join(both, unit.unit);
    },
    date,
    time,
    dateTime: (ms) => `${date(ms)}, ${time(ms)}`,
    day: (isoDay, style = "weekdayDay") =>
      formatDate(
        dayInstant(isoDay),
        "UTC",
        language,
        styleOf(style, () => isoDay),
      ),
    duration: (seconds) => duration(seconds, (value) => number(value, 0)),
    bytes: (count) => bytes(count, number),
  };
}

function duration(seconds: number, whole: (value: number) => string): string {
  const join = (value: number, unit: string) => `${whole(value)}${NO_BREAK_SPACE}${unit}`;
  const total = Math.round(seconds);
  if (total < 120) return join(total, "s");
  const minutes = Math.round(total / 60);
  if (minutes < 120 && minutes % 60 !== 0) return join(minutes, "min");
  const hours = Math.floor(minutes / 60);
  const rest = minutes % 60;
  if (hours >= 48) return join(Math.round(hours / 24), "d");
  return rest === 0 ? join(hours, "h") : `${join(hours, "h")} ${join(rest, "min")}`;
}

function bytes(count: number, number: (value: number, places: number) => string): string {
  const steps: readonly (readonly [number, string])[] = [
    [1e9, "GB"],
    [1e6, "MB"],
    [1e3, "kB"],
  ];
  for (const [size, unit] of steps) {
    if (count >= size) return `${number(count / size, 1)}${NO_BREAK_SPACE}${unit}`;
  }
  return `${number(count, 0)}${NO_BREAK_SPACE}B`;
}
