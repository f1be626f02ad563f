import { CalendarCell } from "./calendar-cell";
import { CellStatus, NumberCell } from "./number-cell";
import type { PlainRows } from "./plain-rows";
import type { ColumnRecipe, DateOrder, FileRecipe } from "./recipe";
import type { RowTokeniser } from "./row-tokeniser";

const MS_PER_DAY = 86_400_000;
const MS_PER_MINUTE = 60_000;
/** Day 25569 of the 1900 spreadsheet calendar is 1 January 1970. */
const SPREADSHEET_EPOCH_DAY = 25_569;
/** 1970 to 2199, as for calendar dates. */
const LAST_MS = Date.UTC(2200, 0, 1);

/** Reads the time of a row. Results stand in the fields until the next call. */
export interface TimeReader {
  /** UTC ms if `isUtc`, else the wall clock's fields as if they were UTC. */
  readonly ms: number;
  readonly isUtc: boolean;
  /** Cells a row needs for its time. */
  readonly neededCells: number;
  /** The column a time problem is reported for. */
  readonly columnIndex: number;
  /** False if the row's time cannot be read. */
  read(row: RowTokeniser): boolean;
  /** Tells the fast way how the date of the row just read is written. */
  teach(row: RowTokeniser, plainRows: PlainRows): void;
}

/** @throws Error for a recipe without time column or with an unanswered date order: ask {@link openQuestions} first. */
export function createTimeReader(recipe: FileRecipe): TimeReader {
  const find = (meaning: ColumnRecipe["meaning"]): ColumnRecipe | undefined =>
    recipe.columns.find((column) => column.meaning === meaning);
  const { format } = recipe.time;
  const single = find("time") ?? (find("timeOfDay") === undefined ? find("date") : undefined);
  if (format.kind !== "calendar") {
    if (single === undefined) throw new Error("The recipe names no time column.");
    return new NumericTimeReader(single, format.kind);
  }
  if (format.order === null) throw new Error("The date order of the recipe is not settled.");
  if (single !== undefined) return new CalendarTimeReader(single.index, format.order);
  const date = find("date");
  const time = find("timeOfDay");
  if (date === undefined || time === undefined) throw new Error("The recipe names no time column.");
  return new SplitTimeReader(date.index, time.index, format.order);
}

class CalendarTimeReader implements TimeReader {
  ms = NaN;
  isUtc = false;
  readonly neededCells: number;
  private readonly cell = new CalendarCell();

  constructor(
    readonly columnIndex: number,
    private readonly order: DateOrder,
  ) {
    this.neededCells = columnIndex + 1;
  }

  read(row: RowTokeniser): boolean {
    const { cell, columnIndex } = this;
    if (!cell.parse(row.buffer, row.starts[columnIndex] as number, row.ends[columnIndex] as number))
      return false;
    if (!cell.hasDate) return false;
    const dayMs = cell.dayMs(this.order);
    if (dayMs === null) return false;
    const offset = cell.offsetMinutes;
    this.isUtc = offset !== null;
    this.ms = dayMs + cell.timeOfDayMs - (offset === null ? 0 : offset * MS_PER_MINUTE);
    return true;
  }

  teach(row: RowTokeniser, plainRows: PlainRows): void {
    teachDate(this.cell, row.starts[this.columnIndex] as number, row, plainRows, this.order);
  }
}

class SplitTimeReader implements TimeReader {
  ms = NaN;
  isUtc = false;
  readonly neededCells: number;
  readonly columnIndex: number;
  private readonly date = new CalendarCell();
  private readonly time = new CalendarCell();

  constructor(
    private readonly dateIndex: number,
    private readonly timeIndex: number,
    private readonly order: DateOrder,
  ) {
    this.neededCells = Math.max(dateIndex, timeIndex) + 1;
    this.columnIndex = dateIndex;
  }

  read(row: RowTokeniser): boolean {
    const { date, time, dateIndex, timeIndex } = this;
    if (!date.parse(row.buffer, row.starts[dateIndex] as number, row.ends[dateIndex] as number))
      return false;
    if (!time.parse(row.buffer, row.starts[timeIndex] as number, row.ends[timeIndex] as number))
      return false;
    // Spreadsheets write dates with a midnight; any other time beside a time column would contradict it.
    if (!date.hasDate || !time.hasTime || time.hasDate || date.timeOfDayMs !== 0) return false;
    const dayMs = date.dayMs(this.order);
    if (dayMs === null) return false;
    const offset = time.offsetMinutes;
    this.isUtc = offset !== null;
    this.ms = dayMs + time.timeOfDayMs - (offset === null ? 0 : offset * MS_PER_MINUTE);
    return true;
  }

  teach(row: RowTokeniser, plainRows: PlainRows): void {
    teachDate(this.date, row.starts[this.dateIndex] as number, row, plainRows, this.order);
  }
}

class NumericTimeReader implements TimeReader {
  ms = NaN;
  readonly isUtc: boolean;
  readonly neededCells: number;
  readonly columnIndex: number;
  private readonly number = new NumberCell();

  constructor(
    private readonly column: ColumnRecipe,
    private readonly kind: "epochSeconds" | "epochMilliseconds" | "spreadsheetDays",
  ) {
    this.columnIndex = column.index;
    this.neededCells = column.index + 1;
    this.isUtc = kind !== "spreadsheetDays";
  }

  read(row: RowTokeniser): boolean {
    const { columnIndex, number } = this;
    const from = row.starts[columnIndex] as number;
    const status = number.parse(
      row.buffer,
      from,
      row.ends[columnIndex] as number,
      this.column.decimalMark,
    );
    if (status !== CellStatus.number) return false;
    // Serial days are written to about a hundredth of a millisecond; rounding takes the binary dust off.
    if (this.kind === "epochSeconds") this.ms = Math.round(number.value * 1000);
    else if (this.kind === "epochMilliseconds") this.ms = Math.round(number.value);
    else this.ms = Math.round((number.value - SPREADSHEET_EPOCH_DAY) * MS_PER_DAY);
    return this.ms >= 0 && this.ms < LAST_MS;
  }

  /** Epochs and serial days have no date to look out for. */
  teach(): void {
    return;
  }
}

function teachDate(
  cell: CalendarCell,
  from: number,
  row: RowTokeniser,
  plainRows: PlainRows,
  order: DateOrder,
): void {
  const length = cell.datePrefixLength;
  const dayMs = cell.dayMs(order);
  if (dayMs !== null) plainRows.learn(row.buffer, from, length, dayMs);
}
