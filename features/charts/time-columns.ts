import {
  addDays,
  isoWeekOf,
  localDateOf,
  localDaysBetween,
  startOfLocalDay,
  weekdayOf,
} from "@shared/domain/time/local-calendar";
import { DAY_MS, HOUR_MS, type Interval } from "@shared/domain/time/interval";

/** What the time axis names: a stretch with a name in its middle. */
export interface TimeColumn extends Interval {
  readonly unit: "day" | "week" | "month" | "year";
  /** First local date of the column. */
  readonly date: string;
}

export interface TimeAxis {
  /** Columns that share time with the view, whole, in order. */
  readonly columns: readonly TimeColumn[];
  /** Hours to mark inside days, where there is room; UTC ms. */
  readonly hours: readonly number[];
}

const LEAST_DAY_PX = 34;
const LEAST_WEEK_PX = 44;
const LEAST_MONTH_PX = 34;
const LEAST_HOUR_PX = 52;

/** The finest of days, weeks, months and years whose names fit the width, in the zone's calendar. */
export function timeAxis(view: Interval, zone: string, width: number): TimeAxis {
  const pxPerDay = width / ((view.endMs - view.startMs) / DAY_MS);
  if (pxPerDay >= LEAST_DAY_PX) {
    const columns = localDaysBetween(view, zone).map((day): TimeColumn => ({
      ...day,
      unit: "day",
    }));
    return { columns, hours: hourMarks(view, zone, pxPerDay) };
  }
  const unit =
    pxPerDay * 7 >= LEAST_WEEK_PX ? "week" : pxPerDay * 30 >= LEAST_MONTH_PX ? "month" : "year";
  const columns: TimeColumn[] = [];
  let date = firstOf(unit, localDateOf(view.startMs, zone));
  for (;;) {
    const next = nextOf(unit, date);
    const startMs = startOfLocalDay(date, zone);
    if (startMs >= view.endMs) return { columns, hours: [] };
    columns.push({ unit, date, startMs, endMs: startOfLocalDay(next, zone) });
    date = next;
  }
}

function firstOf(unit: TimeColumn["unit"], date: string): string {
  if (unit === "week") return addDays(date, 1 - weekdayOf(date));
  return unit === "month" ? `${date.slice(0, 7)}-01` : `${date.slice(0, 4)}-01-01`;
}

function nextOf(unit: TimeColumn["unit"], first: string): string {
  if (unit === "week") return addDays(first, 7);
  const beyond = addDays(first, unit === "month" ? 31 : 366);
  return unit === "month" ? `${beyond.slice(0, 7)}-01` : `${beyond.slice(0, 4)}-01-01`;
}

/** Hours counted from local midnight, so 06:00 is six hours after it but on the day clocks change. */
function hourMarks(view: Interval, zone: string, pxPerDay: number): number[] {
  const every = [1, 2, 3, 6, 12].find((hours) => (pxPerDay / 24) * hours >= LEAST_HOUR_PX);
  if (every === undefined) return [];
  const marks: number[] = [];
  for (const day of localDaysBetween(view, zone)) {
    for (let at = day.startMs + every * HOUR_MS; at < day.endMs; at += every * HOUR_MS) {
      if (at > view.startMs && at < view.endMs) marks.push(at);
    }
  }
  return marks;
}

/** ISO week number of a week column. */
export function weekOf(column: TimeColumn): number {
  return isoWeekOf(column.date).week;
}
