import { CalendarCell } from "./calendar-cell";
import { ColumnEvidence } from "./column-evidence";
import { headerMeaning } from "./header-words";
import { CellStatus, NumberCell } from "./number-cell";
import { PlainScan, type PlainScanRows } from "./plain-scan";
import type { HeadRecognition } from "./recognise-head";
import type { SampleRow } from "./recognition";
import { MAX_CELLS, RowTokeniser } from "./row-tokeniser";
import { createRowStream } from "./row-stream";
import { utf8Validity } from "./text-encoding";
import { TimeEvidence } from "./time-evidence";
import { splitHeader } from "./unit-words";

/** What one pass over all bytes of a file found; see {@link createFileScan}. */
export interface ScanResult {
  /** Rows with a time. */
  readonly dataRowCount: number;
  readonly shortRowCount: number;
  /** Lines after the last row with a time. */
  readonly footerLineCount: number;
  readonly columns: readonly ColumnEvidence[];
  readonly time: TimeEvidence;
  readonly firstTimeCell: string;
  readonly lastTimeCell: string;
  /** A share of the rows, evenly from across the file. */
  readonly sampleRows: readonly SampleRow[];
  /** A quote at the start of any cell of the body. */
  readonly hasQuotes: boolean;
  /** Bytes that are no UTF-8, in a file whose first part is plain ASCII. */
  readonly hasInvalidUtf8: boolean;
}

/** Takes the bytes of a file in order, in chunks of any size; memory stays flat. */
export interface FileScan {
  readonly rowsRead: number;
  push(bytes: Uint8Array): void;
  end(): ScanResult;
}

/** Rows kept at most before every second one is let go. */
const MAX_SAMPLES = 48;

const decoder = new TextDecoder("utf-8");
const EMPTY = new Uint8Array(0);

/**
 * Starts a pass over the whole file that gathers the proofs recognition needs: the row that settles the
 * date order may be the last one.
 */
export function createFileScan(head: HeadRecognition): FileScan {
  return new Scan(head);
}

class Scan implements FileScan, PlainScanRows {
  rowsRead = 0;
  private readonly plain: PlainScan;
  private readonly tokeniser: RowTokeniser;
  private readonly stream;
  private readonly columns: readonly ColumnEvidence[];
  private readonly time = new TimeEvidence();
  private readonly date = new CalendarCell();
  private readonly clock = new CalendarCell();
  private readonly number = new NumberCell();
  private readonly samples: SampleRow[] = [];
  private readonly quote: number;
  private readonly watchUtf8: boolean;
  private readonly needed: number;
  private sampleEvery = 1;
  private shortRows = 0;
  private footer = 0;
  private hasQuotes = false;
  private invalidUtf8 = false;
  private firstTime = "";
  private lastTime = "";
  private lastTimeFrom = 0;
  private lastTimeTo = 0;
  private lastBuffer: Uint8Array = EMPTY;

  constructor(private readonly head: HeadRecognition) {
    this.columns = Array.from({ length: head.columnCount }, (_, i) => {
      const column = new ColumnEvidence();
      const { name } = splitHeader(head.header.headers[i] ?? "");
      column.holdsWords = headerMeaning(name)?.meaning === "status";
      return column;
    });
    // Quotes may first appear far below the head, so they are always looked for.
    // In columns of fixed width a quote is a character like any other.
    const quote = head.dialect.columnStarts ? null : (head.dialect.quote ?? '"');
    this.quote = quote === null ? -1 : quote.charCodeAt(0);
    this.plain = new PlainScan(head, this.columns, this.time, this);
    this.tokeniser = new RowTokeniser(
      { separator: head.dialect.separator, quote },
      (row) => this.readRow(row),
      this.plain,
    );
    this.stream = createRowStream(head.dialect);
    this.watchUtf8 = head.dialect.encoding === "utf-8" && head.encoding.certainty === "likely";
    const { times } = head;
    this.needed =
      Math.max(
        times.kind === "split" ? Math.max(times.dateIndex, times.timeIndex) : times.index,
        1,
      ) + 1;
  }

  push(bytes: Uint8Array): void {
    if (this.watchUtf8 && !this.invalidUtf8)
      this.invalidUtf8 = utf8Validity(withoutTornStart(bytes)) === "invalid";
    this.tokeniser.push(this.stream.convert(bytes));
    this.takeLastTime();
  }

  end(): ScanResult {
    this.tokeniser.push(this.stream.finish());
    this.takeLastTime();
    this.tokeniser.end();
    this.takeLastTime();
    return {
      dataRowCount: this.rowsRead,
      shortRowCount: this.shortRows,
      footerLineCount: this.footer,
      columns: this.columns,
      time: this.time,
      firstTimeCell: this.firstTime,
      lastTimeCell: this.lastTime,
      sampleRows: this.samples,
      hasQuotes: this.hasQuotes,
      hasInvalidUtf8: this.invalidUtf8,
    };
  }

  private readRow(row: RowTokeniser): void {
    if (row.line < this.head.dialect.firstDataLine) return;
    if (row.cellCount < this.needed || !this.readTime(row)) {
      this.footer++;
      return;
    }
    this.footer = 0;
    this.rowsRead++;
    if (row.cellCount < this.head.columnCount) this.shortRows++;
    const count = Math.min(row.cellCount, this.columns.length, MAX_CELLS);
    for (let i = 0; i < count; i++) {
      if (this.isTimeColumn(i)) continue;
      if (!this.hasQuotes && this.startsQuoted(row, i)) this.hasQuotes = true;
      (this.columns[i] as ColumnEvidence).add(row, i);
    }
    if ((this.rowsRead - 1) % this.sampleEvery === 0) this.keepSample(row);
  }

  /** The first row, and each that becomes a sample. */
  get isNextWanted(): boolean {
    return this.rowsRead % this.sampleEvery === 0;
  }

  takeRow(bytes: Uint8Array, timeFrom: number, timeTo: number): void {
    this.footer = 0;
    this.rowsRead++;
    this.lastTimeFrom = timeFrom;
    this.lastTimeTo = timeTo;
    this.lastBuffer = bytes;
  }

  private startsQuoted(row: RowTokeniser, index: number): boolean {
    const start = row.starts[index] as number;
    return start > 0 && row.buffer[start - 1] === this.quote;
  }

  private isTimeColumn(index: number): boolean {
    const { times } = this.head;
    if (times.kind === "split") return index === times.dateIndex || index === times.timeIndex;
    return times.kind === "calendar" && index === times.index;
  }

  private readTime(row: RowTokeniser): boolean {
    const { times } = this.head;
    if (times.kind === "calendar") {
      const from = row.starts[times.index] as number;
      if (!this.hasQuotes && this.startsQuoted(row, times.index)) this.hasQuotes = true;
      if (!this.date.parse(row.buffer, from, row.ends[times.index] as number) || !this.date.hasDate)
        return false;
      if (!this.addTime(row, this.date, this.date, times.index)) return false;
      this.plain.learn(row.buffer, from, this.date.datePrefixLength);
      return true;
    }
    if (times.kind === "split") {
      const { dateIndex, timeIndex } = times;
      if (
        !this.hasQuotes &&
        (this.startsQuoted(row, dateIndex) || this.startsQuoted(row, timeIndex))
      )
        this.hasQuotes = true;
      if (
        !this.date.parse(row.buffer, row.starts[dateIndex] as number, row.ends[dateIndex] as number)
      )
        return false;
      if (
        !this.clock.parse(
          row.buffer,
          row.starts[timeIndex] as number,
          row.ends[timeIndex] as number,
        )
      )
        return false;
      return (
        this.date.hasDate &&
        this.clock.hasTime &&
        this.addTime(row, this.date, this.clock, dateIndex)
      );
    }
    const from = row.starts[times.index] as number;
    const to = row.ends[times.index] as number;
    const isNumber =
      this.number.parse(row.buffer, from, to, ".") === CellStatus.number ||
      this.number.parse(row.buffer, from, to, ",") === CellStatus.number;
    if (isNumber) this.keepTimeCells(row, times.index);
    return isNumber;
  }

  private addTime(
    row: RowTokeniser,
    date: CalendarCell,
    time: CalendarCell,
    index: number,
  ): boolean {
    if (!this.time.add(date, time, row, index)) return false;
    this.keepTimeCells(row, index);
    return true;
  }

  private keepTimeCells(row: RowTokeniser, index: number): void {
    if (this.rowsRead === 0) this.firstTime = row.cellText(index);
    // The last cell is wanted, but a string for every row would cost more than reading it.
    this.lastTimeFrom = row.starts[index] as number;
    this.lastTimeTo = Math.min(row.ends[index] as number, this.lastTimeFrom + 64);
    this.lastBuffer = row.buffer;
  }

  private takeLastTime(): void {
    if (this.lastTimeTo === 0) return;
    this.lastTime = decoder
      .decode(this.lastBuffer.subarray(this.lastTimeFrom, this.lastTimeTo))
      .trim();
    this.lastTimeTo = 0;
    this.lastBuffer = EMPTY;
  }

  private keepSample(row: RowTokeniser): void {
    const cells: string[] = [];
    const count = Math.min(row.cellCount, this.head.columnCount);
    for (let i = 0; i < count; i++) cells.push(row.cellText(i));
    this.samples.push({ line: row.line, cells });
    if (this.samples.length < MAX_SAMPLES) return;
    for (let i = 0; i < MAX_SAMPLES / 2; i++) this.samples[i] = this.samples[2 * i] as SampleRow;
    this.samples.length = MAX_SAMPLES / 2;
    this.sampleEvery *= 2;
  }
}

/** A chunk may begin inside a character; its first continuation bytes are skipped. */
function withoutTornStart(bytes: Uint8Array): Uint8Array {
  let at = 0;
  while (at < 3 && at < bytes.length && ((bytes[at] as number) & 0xc0) === 0x80) at++;
  return bytes.subarray(at);
}
