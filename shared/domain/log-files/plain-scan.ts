import type { ColumnEvidence } from "./column-evidence";
import type { HeadRecognition } from "./recognise-head";
import { twoDigits, type RowsAhead } from "./plain-rows";
import type { TimeEvidence } from "./time-evidence";

const MS_PER_HOUR = 3_600_000;
const MS_PER_MINUTE = 60_000;
const MAX_PREFIX_BYTES = 10;
/** After this many rows in a row that were not plain, the file is left to the careful way. */
const MAX_MISSES = 200;

/** What a plain row does to the scan besides its evidence. */
export interface PlainScanRows {
  /** Whether the next row is one that has to be looked at whole. */
  readonly isNextWanted: boolean;
  takeRow(bytes: Uint8Array, timeFrom: number, timeTo: number): void;
}

/**
 * The scan's fast way for rows that prove nothing new: the date written as in the row before, a time
 * `hh:mm[:ss]`, and in every other column a bare decimal in the mark already proved. Each is counted
 * and its values are taken into the columns' ranges; any other row is left to the careful way.
 */
export class PlainScan implements RowsAhead {
  linesRead = 0;

  private readonly separator: number;
  private readonly firstDataLine: number;
  private readonly timeIndex: number;
  private readonly prefix = new Uint8Array(MAX_PREFIX_BYTES);
  private prefixLength = 0;
  private misses = 0;
  private lastLineFeed = -1;

  constructor(
    head: HeadRecognition,
    private readonly columns: readonly ColumnEvidence[],
    private readonly time: TimeEvidence,
    private readonly rows: PlainScanRows,
  ) {
    this.separator = head.dialect.separator.charCodeAt(0);
    this.firstDataLine = head.dialect.firstDataLine;
    // Other times than a calendar's in one cell never teach a date, so no row is taken.
    this.timeIndex = head.times.kind === "calendar" ? head.times.index : -1;
  }

  /** Takes the date of the row that the careful way has counted last; `length` 0 for one it cannot repeat. */
  learn(bytes: Uint8Array, from: number, length: number): void {
    this.prefixLength = length;
    for (let i = 0; i < length; i++) this.prefix[i] = bytes[from + i] as number;
  }

  begin(bytes: Uint8Array): void {
    this.lastLineFeed = bytes.lastIndexOf(10);
  }

  readFrom(bytes: Uint8Array, from: number, line: number): number {
    this.linesRead = 0;
    if (this.prefixLength === 0 || this.misses > MAX_MISSES || line < this.firstDataLine)
      return from;
    let at = from;
    // Every look at a byte stops at a line feed, so rows before the last one never look past the end.
    while (at <= this.lastLineFeed && !this.rows.isNextWanted) {
      const next = this.readRow(bytes, at);
      if (next < 0) break;
      at = next;
      this.linesRead++;
    }
    this.misses = this.linesRead > 0 || this.rows.isNextWanted ? 0 : this.misses + 1;
    return at;
  }

  /** Start of the next row, or -1 if this one is not plain. Nothing is counted before all of it was read. */
  private readRow(bytes: Uint8Array, from: number): number {
    const { columns, separator, timeIndex } = this;
    const last = columns.length - 1;
    let at = from;
    let timeFrom = 0;
    let timeTo = 0;
    let hour = 0;
    let timeOfDayMs = 0;
    for (let index = 0; index <= last; index++) {
      if (index === timeIndex) {
        timeFrom = at;
        for (let i = 0; i < this.prefixLength; i++) if (bytes[at + i] !== this.prefix[i]) return -1;
        at += this.prefixLength;
        if (bytes[at] !== 32 && bytes[at] !== 84) return -1;
        hour = twoDigits(bytes, at + 1);
        if (hour < 0 || hour > 23 || bytes[at + 3] !== 58) return -1;
        const minute = twoDigits(bytes, at + 4);
        if (minute < 0 || minute > 59) return -1;
        at += 6;
        timeOfDayMs = hour * MS_PER_HOUR + minute * MS_PER_MINUTE;
        if (bytes[at] === 58) {
          const second = twoDigits(bytes, at + 1);
          if (second < 0 || second > 59) return -1;
          timeOfDayMs += second * 1000;
          at += 3;
        }
        timeTo = at;
      } else {
        const column = columns[index] as ColumnEvidence;
        if (column.provedMark === separator) return -1;
        at = column.readUsual(bytes, at);
        if (at < 0) return -1;
      }
      if (index < last && bytes[at++] !== separator) return -1;
    }
    if (bytes[at] === 13 && bytes[at + 1] === 10) at++;
    if (bytes[at] !== 10) return -1;
    if (!this.time.addSameDate(timeOfDayMs, hour)) return -1;
    for (let index = 0; index <= last; index++)
      if (index !== timeIndex) (columns[index] as ColumnEvidence).takeUsual();
    this.rows.takeRow(bytes, timeFrom, timeTo);
    return at + 1;
  }
}
