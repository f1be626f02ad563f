import type { Dialect } from "./recipe";
import type { RowsAhead } from "./plain-rows";
import { concatBytes, copyBytes } from "./text-encoding";

/** Cells after this many are counted, not kept: no logger row is that wide. */
export const MAX_CELLS = 512;
/** A row longer than this is reported as one unreadable row, so that memory stays flat. */
export const MAX_ROW_BYTES = 1 << 20;
/** A quoted cell spanning more lines than this has lost its closing quote. */
const MAX_LINES_IN_CELL = 20;
/** Bytes of a chunk joined to the row left over from the one before; most rows are far shorter. */
const JOINED_BYTES = 1 << 14;

const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;
const SPACE = 32;

const PLAIN = 0;
const IS_SEPARATOR = 1;
const IS_LINE_END = 2;

const decoder = new TextDecoder("utf-8");
const EMPTY = new Uint8Array(0);

/**
 * Splits a stream of UTF-8 bytes into rows and cells without making a string.
 *
 * During `onRow` the cells of the row are `buffer[starts[i] … ends[i])`, quotes removed; nothing of it
 * survives the call. Blank lines are counted as lines but are no rows. Line numbers are 1-based and
 * physical: a cell that holds a line break advances them.
 */
export class RowTokeniser {
  buffer: Uint8Array = EMPTY;
  readonly starts = new Int32Array(MAX_CELLS);
  readonly ends = new Int32Array(MAX_CELLS);
  /** Cells in the row, also those beyond {@link MAX_CELLS}. */
  cellCount = 0;
  /** Line on which the row starts. */
  line = 0;
  /** True for a row over {@link MAX_ROW_BYTES}; it has no cells. */
  oversize = false;

  private readonly classes = new Uint8Array(256);
  private readonly separator: number;
  private readonly quote: number;
  private readonly isPlain: boolean;
  private carry: Uint8Array = EMPTY;
  private nextLine = 1;
  private lineBreaksInRow = 0;
  private ownsBuffer = false;
  private discarding = false;
  private quotedStart = 0;
  private quotedEnd = 0;
  /** Start and end of cells with doubled quotes; closed up once the row is known to be whole. */
  private readonly doubled: number[] = [];

  constructor(
    dialect: Pick<Dialect, "separator" | "quote">,
    private readonly onRow: (row: RowTokeniser) => void,
    /** Takes plain rows before they are split into cells; only used where there are no quotes. */
    private readonly ahead: RowsAhead | null = null,
  ) {
    this.separator = dialect.separator.charCodeAt(0);
    this.quote = dialect.quote === null ? -1 : dialect.quote.charCodeAt(0);
    this.isPlain = this.quote < 0 && this.separator !== SPACE;
    this.classes[this.separator] = IS_SEPARATOR;
    this.classes[LINE_FEED] = IS_LINE_END;
    this.classes[CARRIAGE_RETURN] = IS_LINE_END;
  }

  /** The text of a cell, trimmed; at most 200 bytes of it. "" where the row has no such cell. */
  cellText(index: number): string {
    if (index >= Math.min(this.cellCount, MAX_CELLS)) return "";
    const start = this.starts[index] as number;
    const end = Math.min(this.ends[index] as number, start + 200);
    return decoder.decode(this.buffer.subarray(start, end)).trim();
  }

  push(chunk: Uint8Array): void {
    if (chunk.length === 0) return;
    let from = 0;
    this.buffer = chunk;
    this.ownsBuffer = false;
    if (this.discarding) {
      from = this.discard();
      if (this.discarding) return;
    } else if (this.carry.length > 0) {
      from = this.joinCarry(chunk);
    }
    from = this.readRows(from, false);
    const left = this.buffer.length - from;
    if (left > MAX_ROW_BYTES) {
      this.discarding = true;
      this.carry = EMPTY;
    } else {
      this.carry = copyBytes(this.buffer.subarray(from));
    }
    this.buffer = EMPTY;
  }

  /**
   * Reads the row that the chunk before left unfinished. Returns where to go on in `buffer`, which is
   * the chunk again unless the row is longer than the joined piece.
   */
  private joinCarry(chunk: Uint8Array): number {
    const { carry } = this;
    this.carry = EMPTY;
    if (chunk.length > JOINED_BYTES) {
      this.buffer = concatBytes(carry, chunk.subarray(0, JOINED_BYTES));
      const next = this.readRows(0, false);
      if (next >= carry.length) {
        this.buffer = chunk;
        this.ownsBuffer = false;
        return next - carry.length;
      }
    }
    this.buffer = concatBytes(carry, chunk);
    return 0;
  }

  end(): void {
    this.buffer = this.carry;
    this.carry = EMPTY;
    if (this.discarding) {
      this.discarding = false;
      this.emitOversize();
      return;
    }
    this.readRows(0, true);
  }

  /** Reads whole rows from `from` on; returns where the first incomplete row starts. */
  private readRows(from: number, final: boolean): number {
    // A stretch without any quote needs no looking out for them.
    const isPlain =
      this.isPlain ||
      (this.quote >= 0 && this.separator !== SPACE && !this.buffer.includes(this.quote, from));
    if (isPlain) {
      this.ahead?.begin(this.buffer);
      return this.readPlainRows(from, final);
    }
    const length = this.buffer.length;
    let at = from;
    while (at < length) {
      this.lineBreaksInRow = 0;
      this.doubled.length = 0;
      const next = this.readRow(at, final);
      if (next < 0) return at;
      if (this.doubled.length > 0) this.closeUpQuotes();
      this.line = this.nextLine;
      this.nextLine += 1 + this.lineBreaksInRow;
      at = next;
      if (this.cellCount > 1 || (this.starts[0] as number) < (this.ends[0] as number)) {
        this.oversize = false;
        this.onRow(this);
      }
    }
    return at;
  }

  /**
   * {@link readRows} for dialects without quotes and collapsing spaces: the way nearly all bytes go,
   * so the whole loop is spelled out here.
   */
  private readPlainRows(from: number, final: boolean): number {
    const { buffer, classes, starts, ends, onRow, ahead } = this;
    const length = buffer.length;
    const maxCells = MAX_CELLS;
    let rowStart = from;
    let start = from;
    let cell = 0;
    for (let at = from; at < length; at++) {
      if (ahead !== null && at === rowStart) {
        const next = ahead.readFrom(buffer, at, this.nextLine);
        this.nextLine += ahead.linesRead;
        rowStart = next;
        start = next;
        if (next >= length) break;
        at = next;
      }
      const kind = classes[buffer[at] as number] as number;
      if (kind === 0) continue;
      if (cell < maxCells) {
        starts[cell] = start;
        ends[cell] = at;
      }
      cell++;
      if (kind === IS_SEPARATOR) {
        start = at + 1;
        continue;
      }
      let next = at + 1;
      if (buffer[at] === CARRIAGE_RETURN) {
        // At the very end of a chunk it may be followed by its line feed.
        if (next >= length && !final) break;
        if (buffer[next] === LINE_FEED) next++;
      }
      this.line = this.nextLine++;
      if (cell > 1 || at > start) {
        this.cellCount = cell;
        this.oversize = false;
        onRow(this);
      }
      cell = 0;
      rowStart = next;
      start = next;
      at = next - 1;
    }
    if (!final || rowStart >= length) return rowStart;
    if (cell < maxCells) {
      starts[cell] = start;
      ends[cell] = length;
    }
    this.cellCount = cell + 1;
    this.oversize = false;
    this.line = this.nextLine++;
    onRow(this);
    return length;
  }

  /** Finds the cells of one row; returns the start of the next row, or -1 if the row is not complete yet. */
  private readRow(from: number, final: boolean): number {
    const { buffer, classes, starts, ends, separator, quote } = this;
    const length = buffer.length;
    const collapses = separator === SPACE;
    let at = from;
    let cell = 0;
    if (collapses) while (at < length && buffer[at] === SPACE) at++;
    for (;;) {
      let start = at;
      if (quote >= 0) {
        const quoted = this.readQuoted(at, final);
        if (quoted === -1) return -1;
        if (quoted >= 0) {
          if (cell < MAX_CELLS) {
            starts[cell] = this.quotedStart;
            ends[cell] = this.quotedEnd;
          }
          start = -1;
          at = quoted;
        }
      }
      while (at < length && classes[buffer[at] as number] === PLAIN) at++;
      if (start >= 0 && cell < MAX_CELLS) {
        starts[cell] = start;
        ends[cell] = at;
      }
      if (at >= length) {
        if (!final) return -1;
        this.cellCount = cell + 1;
        return length;
      }
      const byte = buffer[at] as number;
      if (byte === separator) {
        at++;
        if (!collapses) {
          cell++;
          continue;
        }
        while (at < length && buffer[at] === SPACE) at++;
        if (at >= length && !final) return -1;
        // Spaces before the line end close the row; they open no further cell.
        if (at < length && classes[buffer[at] as number] !== IS_LINE_END) {
          cell++;
          continue;
        }
        if (at >= length) {
          this.cellCount = cell + 1;
          return length;
        }
      }
      this.cellCount = cell + 1;
      return this.afterLineEnd(at, final);
    }
  }

  private afterLineEnd(at: number, final: boolean): number {
    if (this.buffer[at] === LINE_FEED) return at + 1;
    if (at + 1 < this.buffer.length) return this.buffer[at + 1] === LINE_FEED ? at + 2 : at + 1;
    // A carriage return at the very end of a chunk may be followed by its line feed.
    return final ? at + 1 : -1;
  }

  /**
   * Reads a quoted cell at `from`. Returns the place of the separator or line end after it,
   * -1 if the buffer ends first, -2 if the cell is not properly quoted and is to be read as plain.
   */
  private readQuoted(from: number, final: boolean): number {
    const { buffer, quote, classes } = this;
    const length = buffer.length;
    let at = from;
    while (at < length && buffer[at] === SPACE && this.separator !== SPACE) at++;
    if (at >= length || buffer[at] !== quote) return -2;
    at++;
    const start = at;
    let write = at;
    let shifted = false;
    let breaks = 0;
    for (; at < length; at++) {
      const byte = buffer[at] as number;
      if (byte === quote) {
        if (at + 1 < length && buffer[at + 1] === quote) {
          at++;
          shifted = true;
        } else break;
      } else if (byte === LINE_FEED || (byte === CARRIAGE_RETURN && buffer[at + 1] !== LINE_FEED)) {
        if (++breaks > MAX_LINES_IN_CELL) return -2;
      }
      write++;
    }
    if (at + 1 >= length && !final) return -1;
    if (at >= length) return -2;
    let after = at + 1;
    while (after < length && buffer[after] === SPACE && this.separator !== SPACE) after++;
    if (after >= length && !final) return -1;
    if (after < length && classes[buffer[after] as number] === PLAIN) return -2;
    if (shifted) this.doubled.push(start, at);
    this.quotedStart = start;
    this.quotedEnd = write;
    this.lineBreaksInRow += breaks;
    return after;
  }

  /** Turns the doubled quotes of the row into single ones, in a copy: the bytes are the caller's. */
  private closeUpQuotes(): void {
    if (!this.ownsBuffer) this.buffer = copyBytes(this.buffer);
    this.ownsBuffer = true;
    for (let i = 0; i < this.doubled.length; i += 2) {
      let write = this.doubled[i] as number;
      const end = this.doubled[i + 1] as number;
      for (let read = write; read < end; read++) {
        const byte = this.buffer[read] as number;
        if (byte === this.quote && this.buffer[read + 1] === this.quote) read++;
        this.buffer[write++] = byte;
      }
    }
  }

  /** Skips to the end of an oversize row; returns where the next row starts. */
  private discard(): number {
    const { buffer } = this;
    for (let at = 0; at < buffer.length; at++) {
      const byte = buffer[at];
      if (byte === LINE_FEED || byte === CARRIAGE_RETURN) {
        this.discarding = false;
        this.emitOversize();
        return byte === CARRIAGE_RETURN && buffer[at + 1] === LINE_FEED ? at + 2 : at + 1;
      }
    }
    return buffer.length;
  }

  private emitOversize(): void {
    this.line = this.nextLine++;
    this.cellCount = 0;
    this.oversize = true;
    this.onRow(this);
  }
}
