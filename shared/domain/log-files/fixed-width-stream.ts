import { MAX_ROW_BYTES } from "./row-tokeniser";
import { concatBytes, copyBytes, type Utf8Stream } from "./text-encoding";

/** Cells are set apart by this once their places are known; a tab within a line becomes a space. */
export const FIXED_WIDTH_SEPARATOR = "\t";

const TAB = 9;
const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;
const SPACE = 32;
const EMPTY = new Uint8Array(0);

/**
 * Turns lines whose columns begin at fixed characters into lines with tabs, as a stream. Characters are
 * Unicode code points, so `°` and `³` take one place as they do on screen; line numbers stay.
 *
 * From `firstDataLine` on, a word that lies across a boundary is two cells run together, or one cut in
 * two: nobody can tell, so the line gets one cell more than there are columns and is reported, not read.
 * Above it, in headers and remarks, such a word goes whole to the column that holds more of it.
 * @param columnStarts 0-based characters, ascending, the first 0
 */
export function createFixedWidthStream(
  inner: Utf8Stream,
  columnStarts: readonly number[],
  firstDataLine: number,
): Utf8Stream {
  return new FixedWidthStream(inner, columnStarts, firstDataLine);
}

class FixedWidthStream implements Utf8Stream {
  private readonly starts: Int32Array;
  /** Bytes at which the columns of the line begin. */
  private readonly cuts: Int32Array;
  private carry: Uint8Array = EMPTY;
  private out = new Uint8Array(1 << 16);
  private written = 0;
  private line = 1;
  /** In a line too long for any logger: passed on as it is. */
  private isPassing = false;

  constructor(
    private readonly inner: Utf8Stream,
    columnStarts: readonly number[],
    private readonly firstDataLine: number,
  ) {
    this.starts = Int32Array.from(columnStarts);
    this.cuts = new Int32Array(columnStarts.length + 1);
  }

  convert(chunk: Uint8Array): Uint8Array {
    this.written = 0;
    this.take(this.inner.convert(chunk), false);
    return this.out.subarray(0, this.written);
  }

  finish(): Uint8Array {
    this.written = 0;
    this.take(this.inner.finish(), true);
    return this.out.subarray(0, this.written);
  }

  private take(bytes: Uint8Array, final: boolean): void {
    const data = this.carry.length === 0 ? bytes : concatBytes(this.carry, bytes);
    this.carry = EMPTY;
    let from = 0;
    for (let at = 0; at < data.length; at++) {
      const byte = data[at] as number;
      if (byte !== LINE_FEED && byte !== CARRIAGE_RETURN) continue;
      let next = at + 1;
      if (byte === CARRIAGE_RETURN) {
        // At the very end of a chunk it may be followed by its line feed.
        if (next >= data.length && !final) break;
        if (data[next] === LINE_FEED) next++;
      }
      this.writeLine(data, from, at);
      this.writeBytes(data, at, next);
      this.line++;
      from = next;
      at = next - 1;
    }
    if (from >= data.length) return;
    if (final) this.writeLine(data, from, data.length);
    else if (this.isPassing || data.length - from > MAX_ROW_BYTES) {
      this.isPassing = true;
      // A trailing carriage return waits for what follows it.
      const to = data[data.length - 1] === CARRIAGE_RETURN ? data.length - 1 : data.length;
      this.writeBytes(data, from, to);
      this.carry = copyBytes(data.subarray(to));
    } else this.carry = copyBytes(data.subarray(from));
  }

  private writeLine(data: Uint8Array, from: number, to: number): void {
    if (this.isPassing) {
      this.isPassing = false;
      this.writeBytes(data, from, to);
      return;
    }
    let end = to;
    while (end > from && isBlank(data[end - 1] as number)) end--;
    if (end === from) return;
    const count = this.findCuts(data, from, end);
    let isCut = false;
    for (let i = 1; i < count; i++) {
      const at = this.cuts[i] as number;
      if (isBlank(data[at - 1] as number) || isBlank(data[at] as number)) continue;
      if (this.line < this.firstDataLine) this.moveCut(data, from, end, i);
      else isCut = true;
    }
    this.reserve(end - from + this.starts.length + 4);
    for (let i = 0; i < count; i++) {
      if (i > 0) this.out[this.written++] = TAB;
      this.writeCell(
        data,
        this.cuts[i] as number,
        i + 1 < count ? (this.cuts[i + 1] as number) : end,
      );
    }
    // A short line's empty columns at the end are there, only not written.
    for (let i = Math.max(count, 1); i < this.starts.length; i++) this.out[this.written++] = TAB;
    if (!isCut) return;
    this.out[this.written++] = TAB;
    this.out[this.written++] = 0x3f;
  }

  /** Finds where columns begin in the bytes of a line; returns how many begin before its end. */
  private findCuts(data: Uint8Array, from: number, end: number): number {
    const { starts, cuts } = this;
    let column = 0;
    let character = 0;
    for (let at = from; at < end && column < starts.length; at++) {
      if (((data[at] as number) & 0xc0) === 0x80) continue;
      if (character === starts[column]) cuts[column++] = at;
      character++;
    }
    return column;
  }

  private moveCut(data: Uint8Array, from: number, end: number, index: number): void {
    const at = this.cuts[index] as number;
    let wordFrom = at;
    let wordTo = at;
    while (wordFrom > from && !isBlank(data[wordFrom - 1] as number)) wordFrom--;
    while (wordTo < end && !isBlank(data[wordTo] as number)) wordTo++;
    const wanted = at - wordFrom <= wordTo - at ? wordFrom : wordTo;
    this.cuts[index] = Math.max(wanted, this.cuts[index - 1] as number);
  }

  private writeCell(data: Uint8Array, from: number, to: number): void {
    let start = from;
    let end = to;
    while (start < end && isBlank(data[start] as number)) start++;
    while (end > start && isBlank(data[end - 1] as number)) end--;
    for (let at = start; at < end; at++) {
      const byte = data[at] as number;
      this.out[this.written++] = byte === TAB ? SPACE : byte;
    }
  }

  private writeBytes(data: Uint8Array, from: number, to: number): void {
    this.reserve(to - from);
    for (let at = from; at < to; at++) {
      const byte = data[at] as number;
      this.out[this.written++] = byte === TAB ? SPACE : byte;
    }
  }

  private reserve(bytes: number): void {
    if (this.written + bytes <= this.out.length) return;
    const grown = new Uint8Array(Math.max(this.out.length * 2, this.written + bytes));
    grown.set(this.out.subarray(0, this.written));
    this.out = grown;
  }
}

function isBlank(byte: number): boolean {
  return byte === SPACE || byte === TAB;
}
