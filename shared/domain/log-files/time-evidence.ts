import type { CalendarCell } from "./calendar-cell";
import type { Place } from "./column-evidence";
import { DATE_ORDERS, OrderBit } from "./date-orders";
import type { DateOrder } from "./recipe";
import type { RowTokeniser } from "./row-tokeniser";

const DAY_MS = 86_400_000;
const MAX_STEPS = 2000;
/** Under a wrong place of a two-digit year, the next day is this far away. */
const ALMOST_A_YEAR_MS = 300 * DAY_MS;

export interface OrderFinding {
  /** Orders that some row does not rule out, in the order of {@link DATE_ORDERS}. */
  readonly candidates: readonly DateOrder[];
  /** The row that leaves a single candidate; null where there are several. */
  readonly proof: Place | null;
  /** Typical step under each candidate: over changes of date where there are any. */
  readonly stepSeconds: readonly (number | null)[];
}

/**
 * Gathers what the timestamps of the whole file prove about the order of day, month and year.
 *
 * A row proves by ruling out: 13 cannot be a month. Rows possible under no order are damaged and prove
 * nothing. Steps between rows only tell year-first from year-last with two-digit years, where the wrong
 * reading puts every midnight a year away; day against month is never decided by steps.
 */
export class TimeEvidence {
  rows = 0;
  withOffset = 0;
  firstCell = "";
  /** The first row whose year has two digits whatever the order; null where all have four. */
  shortYear: Place | null = null;
  private readonly ruledOut = new Map<DateOrder, Place>();
  private seen = 0;
  private readonly changeSteps: Record<DateOrder, number[]> = {
    dayMonthYear: [],
    monthDayYear: [],
    yearMonthDay: [],
  };
  private readonly nearChanges: Record<DateOrder, number> = {
    dayMonthYear: 0,
    monthDayYear: 0,
    yearMonthDay: 0,
  };
  private readonly farChanges: Record<DateOrder, number> = {
    dayMonthYear: 0,
    monthDayYear: 0,
    yearMonthDay: 0,
  };
  private changes = 0;
  private readonly plainSteps: number[] = [];
  private firstDateChange: Place | null = null;

  private previous: {
    first: number;
    second: number;
    third: number;
    timeOfDayMs: number;
    day: Record<DateOrder, number | null>;
  } | null = null;
  private maxHour = 0;
  private minHour = 24;
  private halfDayMarks = 0;
  private halfDayWraps = 0;
  private wrapPlace: Place | null = null;

  /** @param column of the date in `row`, for naming the rows that prove something */
  add(date: CalendarCell, time: CalendarCell, row: RowTokeniser, column: number): boolean {
    const before = this.previous;
    const sameDate =
      before !== null &&
      before.first === date.first &&
      before.second === date.second &&
      before.third === date.third;
    if (!sameDate) {
      const mask = date.orderMask();
      if (mask === 0) return false;
      if ((this.seen | mask) !== this.seen || mask !== 7) this.weigh(mask, row, column);
    }
    this.rows++;
    if (this.rows === 1) this.firstCell = row.cellText(column);
    if (date.offsetMinutes !== null || time.offsetMinutes !== null) this.withOffset++;
    this.watchHours(time, sameDate ? before : null, row, column);
    if (sameDate) {
      this.addPlainStep(before, time.timeOfDayMs);
      return true;
    }
    if (this.shortYear === null && date.firstDigits !== 4 && date.thirdDigits !== 4)
      this.shortYear = placeOf(row, column);
    const day = {
      dayMonthYear: date.dayMs("dayMonthYear"),
      monthDayYear: date.dayMs("monthDayYear"),
      yearMonthDay: date.dayMs("yearMonthDay"),
    };
    if (before !== null) this.addDateChange(before, day, time.timeOfDayMs, row, column);
    this.previous = {
      first: date.first,
      second: date.second,
      third: date.third,
      timeOfDayMs: time.timeOfDayMs,
      day,
    };
    return true;
  }

  /**
   * {@link add} for a row with the date of the row before and a plain time without AM, PM or offset.
   * False, and nothing is counted, where the row shows more than its time: then it needs `add`.
   */
  addSameDate(timeOfDayMs: number, hour: number): boolean {
    const before = this.previous;
    if (before === null || isHalfDayWrap(before.timeOfDayMs, timeOfDayMs)) return false;
    this.rows++;
    if (hour > this.maxHour) this.maxHour = hour;
    if (hour < this.minHour) this.minHour = hour;
    this.addPlainStep(before, timeOfDayMs);
    return true;
  }

  private addPlainStep(before: { timeOfDayMs: number }, timeOfDayMs: number): void {
    const step = timeOfDayMs - before.timeOfDayMs;
    if (this.plainSteps.length < MAX_STEPS && step > 0) this.plainSteps.push(step);
    before.timeOfDayMs = timeOfDayMs;
  }

  private weigh(mask: number, row: RowTokeniser, column: number): void {
    this.seen |= mask;
    for (const order of DATE_ORDERS) {
      if ((mask & OrderBit[order]) === 0 && !this.ruledOut.has(order))
        this.ruledOut.set(order, placeOf(row, column));
    }
  }

  private addDateChange(
    before: NonNullable<TimeEvidence["previous"]>,
    day: Record<DateOrder, number | null>,
    timeOfDayMs: number,
    row: RowTokeniser,
    column: number,
  ): void {
    this.changes++;
    this.firstDateChange ??= placeOf(row, column);
    for (const order of DATE_ORDERS) {
      const from = before.day[order];
      const to = day[order];
      if (from === null || to === null) continue;
      const step = to + timeOfDayMs - from - before.timeOfDayMs;
      if (step > 0 && step <= 2 * DAY_MS) this.nearChanges[order]++;
      if (Math.abs(step) >= ALMOST_A_YEAR_MS) this.farChanges[order]++;
      if (this.changeSteps[order].length < MAX_STEPS) this.changeSteps[order].push(step);
    }
  }

  private watchHours(
    time: CalendarCell,
    before: { readonly timeOfDayMs: number } | null,
    row: RowTokeniser,
    column: number,
  ): void {
    if (!time.hasTime) return;
    if (time.hasHalfDayMark) this.halfDayMarks++;
    this.maxHour = Math.max(this.maxHour, time.writtenHour);
    this.minHour = Math.min(this.minHour, time.writtenHour);
    if (before !== null && isHalfDayWrap(before.timeOfDayMs, time.timeOfDayMs)) {
      this.halfDayWraps++;
      this.wrapPlace ??= placeOf(row, column);
    }
  }

  /** A row where 12:59 is followed by 1:00 of the same day, in a file whose hours never leave 1 to 12 and have no AM or PM. */
  halfDayUnknown(): Place | null {
    const twelveHours = this.halfDayMarks === 0 && this.minHour >= 1 && this.maxHour === 12;
    return twelveHours && this.halfDayWraps > 0 ? this.wrapPlace : null;
  }

  order(): OrderFinding {
    let candidates = DATE_ORDERS.filter(
      (order) => (this.seen & OrderBit[order]) !== 0 && !this.ruledOut.has(order),
    );
    // Two rows contradict each other: every order that reads some of the file is left to choose from.
    if (candidates.length === 0)
      candidates = DATE_ORDERS.filter((order) => (this.seen & OrderBit[order]) !== 0);
    let proof = this.proofAmong(candidates);
    if (candidates.length > 1 && candidates.includes("yearMonthDay")) {
      const yearFirst = candidates.filter((order) => order === "yearMonthDay");
      const yearLast = candidates.filter((order) => order !== "yearMonthDay");
      if (this.runsWell(yearFirst) && this.isScattered(yearLast)) candidates = yearFirst;
      else if (this.runsWell(yearLast) && this.isScattered(yearFirst)) candidates = yearLast;
      if (candidates.length === 1) proof = this.firstDateChange;
    }
    return { candidates, proof, stepSeconds: candidates.map((order) => this.stepSeconds(order)) };
  }

  private proofAmong(candidates: readonly DateOrder[]): Place | null {
    if (candidates.length !== 1) return null;
    const places = [...this.ruledOut]
      .filter(([order]) => !candidates.includes(order))
      .map(([, place]) => place);
    // The last thing to be ruled out is what left one order standing.
    return places.reduce<Place | null>(
      (latest, place) => (latest === null || place.line > latest.line ? place : latest),
      null,
    );
  }

  private runsWell(orders: readonly DateOrder[]): boolean {
    return orders.some((order) => this.nearChanges[order] > 0);
  }

  private isScattered(orders: readonly DateOrder[]): boolean {
    return orders.every((order) => this.changes > 0 && this.farChanges[order] === this.changes);
  }

  private stepSeconds(order: DateOrder): number | null {
    const steps = this.changeSteps[order].length > 0 ? this.changeSteps[order] : this.plainSteps;
    if (steps.length === 0) return null;
    const sorted = steps.map(Math.abs).sort((a, b) => a - b);
    return (sorted[sorted.length >> 1] as number) / 1000;
  }
}

function isHalfDayWrap(beforeMs: number, timeOfDayMs: number): boolean {
  return beforeMs >= DAY_MS / 2 && timeOfDayMs < 2 * 3_600_000;
}

function placeOf(row: RowTokeniser, column: number): Place {
  return { line: row.line, cell: row.cellText(column) };
}
