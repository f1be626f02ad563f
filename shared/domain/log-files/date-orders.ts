import type { DateOrder } from "./recipe";

/** Bits of the orders in which a date can be read. */
export const OrderBit = {
  dayMonthYear: 1,
  monthDayYear: 2,
  yearMonthDay: 4,
} as const satisfies Record<DateOrder, number>;
export const DATE_ORDERS: readonly DateOrder[] = ["dayMonthYear", "monthDayYear", "yearMonthDay"];

/** Years outside are typing errors or broken clocks. */
const FIRST_YEAR = 1970;
const LAST_YEAR = 2199;
/** Two-digit years from here on belong to the last century: loggers are younger than that. */
const TWO_DIGIT_PIVOT = 70;

/** The three fields of a date as they stand in the cell. */
export interface DateFields {
  readonly first: number;
  readonly second: number;
  readonly third: number;
  readonly firstDigits: number;
  readonly secondDigits: number;
  readonly thirdDigits: number;
  /** Which field is a month's name, or -1. */
  readonly namedField: -1 | 0 | 1;
}

/** Midnight of the date as if its zone were UTC, or null if there is no such date in this order. */
export function dayMsOf(date: DateFields, order: DateOrder): number | null {
  if (date.namedField === 0 && order !== "monthDayYear") return null;
  if (date.namedField === 1 && order === "monthDayYear") return null;
  let year = date.third;
  let yearDigits = date.thirdDigits;
  let month = date.second;
  let day = date.first;
  let otherDigits = date.firstDigits;
  if (order === "monthDayYear") {
    month = date.first;
    day = date.second;
  } else if (order === "yearMonthDay") {
    year = date.first;
    yearDigits = date.firstDigits;
    day = date.third;
    otherDigits = date.thirdDigits;
  }
  if (otherDigits > 2 || date.secondDigits > 2) return null;
  if (yearDigits === 2) year += year < TWO_DIGIT_PIVOT ? 2000 : 1900;
  else if (yearDigits !== 4) return null;
  if (year < FIRST_YEAR || year > LAST_YEAR || month < 1 || month > 12 || day < 1) return null;
  if (day > daysInMonth(year, month)) return null;
  return Date.UTC(year, month - 1, day);
}

function daysInMonth(year: number, month: number): number {
  if (month === 2) return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0) ? 29 : 28;
  return month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31;
}
