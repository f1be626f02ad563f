import { CellStatus, NumberCell } from "./number-cell";
import type { DecimalMark } from "./recipe";
import type { RowTokeniser } from "./row-tokeniser";
import { isNumericSentinel, looksLikeEndStop, LOWEST_USUAL } from "./sentinels";
import { WordList } from "./status-words";

/** A cell that shows something, and where it stands. */
export interface Place {
  readonly line: number;
  readonly cell: string;
}

/** What a number's marks prove about its column. */
export const MarkKind = {
  none: 0,
  provesPoint: 1,
  provesComma: 2,
  eitherPoint: 3,
  eitherComma: 4,
  noNumber: 5,
} as const;

const MAX_TOKENS = 50;
const MAX_EXACT_DIGITS = 15;
const POWERS_OF_TEN = Float64Array.from({ length: MAX_EXACT_DIGITS + 1 }, (_, i) =>
  Number(`1e${i}`),
);
const COMMA = 44;
const MINUS = 45;
const POINT = 46;

/**
 * Gathers what the cells of one column prove about its decimal mark, and the range of its values.
 * `6.35` proves the point, `1.234,5` the comma; `1.234` alone proves neither.
 */
export class ColumnEvidence {
  pointProof: Place | null = null;
  commaProof: Place | null = null;
  /** First cell that is a number in both conventions, a different one in each. */
  eitherPoint: Place | null = null;
  eitherComma: Place | null = null;
  numbers = 0;
  empties = 0;
  texts = 0;
  /** Tokens and numbers that mean "no reading", by how they are named. */
  readonly tokens = new Map<string, number>();
  /** Words that are no numbers, in the order they come. */
  readonly words = new WordList();
  /** The column's header says that it holds words, even where they are figures. */
  holdsWords = false;

  private readonly sure = new Extremes();
  private readonly ifDecimal = new Extremes();
  private readonly ifThousands = new Extremes();
  private readonly number = new NumberCell();
  private usual = NaN;

  add(row: RowTokeniser, index: number): void {
    const from = row.starts[index] as number;
    const to = row.ends[index] as number;
    if (this.holdsWords) {
      this.addWord(row, from, to);
      return;
    }
    if (this.addUsual(row.buffer, from, to)) return;
    const kind = markKind(row.buffer, from, to);
    if (kind === MarkKind.noNumber) {
      this.addOther(row, index, from, to);
      return;
    }
    const mark: DecimalMark =
      kind === MarkKind.provesComma || kind === MarkKind.eitherComma ? "," : ".";
    if (this.number.parse(row.buffer, from, to, mark) !== CellStatus.number) {
      this.addOther(row, index, from, to);
      return;
    }
    const value = this.number.value;
    if (isNumericSentinel(value)) {
      // Firmware writes it in its own way: it proves no mark.
      this.countToken(row.cellText(index));
      return;
    }
    this.numbers++;
    if (kind === MarkKind.eitherPoint || kind === MarkKind.eitherComma) {
      this.ifDecimal.add(value);
      if (kind === MarkKind.eitherPoint) this.eitherPoint ??= place(row, index);
      else this.eitherComma ??= place(row, index);
      this.number.parse(row.buffer, from, to, mark === "." ? "," : ".");
      this.ifThousands.add(this.number.value);
      return;
    }
    this.sure.add(value);
    if (kind === MarkKind.provesPoint) this.pointProof ??= place(row, index);
    else if (kind === MarkKind.provesComma) this.commaProof ??= place(row, index);
  }

  /** The usual cell, in one pass; false for any other. */
  private addUsual(bytes: Uint8Array, from: number, to: number): boolean {
    if (this.readUsual(bytes, from) !== to) return false;
    this.takeUsual();
    return true;
  }

  /** The mark already proved, as a byte; -1 before. */
  get provedMark(): number {
    return this.pointProof !== null ? POINT : this.commaProof !== null ? COMMA : -1;
  }

  /**
   * Reads the usual cell, a bare decimal in the mark already proved, and keeps its value for
   * {@link takeUsual}. Returns where the number ends, or -1 where there is no usual one.
   */
  readUsual(bytes: Uint8Array, from: number): number {
    if (this.holdsWords) return -1;
    const mark = this.provedMark;
    let at = from;
    const negative = bytes[at] === MINUS;
    if (negative) at++;
    const start = at;
    let mantissa = 0;
    let markAt = -1;
    for (; ; at++) {
      const byte = bytes[at] as number;
      const digit = byte - 48;
      if (digit >= 0 && digit <= 9) mantissa = mantissa * 10 + digit;
      else if (byte === mark && markAt < 0) markAt = at;
      else break;
    }
    const digits = at - start - (markAt < 0 ? 0 : 1);
    if (digits === 0 || digits > MAX_EXACT_DIGITS) return -1;
    const value = markAt < 0 ? mantissa : mantissa / (POWERS_OF_TEN[at - markAt - 1] as number);
    if (negative && -value <= LOWEST_USUAL) return -1;
    this.usual = negative ? -value : value;
    return at;
  }

  /** Counts the number that {@link readUsual} has just read. */
  takeUsual(): void {
    this.numbers++;
    this.sure.add(this.usual);
  }

  private addOther(row: RowTokeniser, index: number, from: number, to: number): void {
    const status = this.number.parse(row.buffer, from, to, ".");
    if (status === CellStatus.empty) this.empties++;
    else if (status === CellStatus.token) {
      this.countToken(this.number.text);
      this.words.add(row.buffer, from, to);
    } else {
      this.texts++;
      this.words.add(row.buffer, from, to);
    }
  }

  private addWord(row: RowTokeniser, from: number, to: number): void {
    this.words.add(row.buffer, from, to);
    const status = this.number.parse(row.buffer, from, to, ".");
    if (status === CellStatus.empty) this.empties++;
    else if (status === CellStatus.token) this.countToken(this.number.text);
    else if (status === CellStatus.number) this.numbers++;
    else this.texts++;
  }

  private countToken(token: string): void {
    const seen = this.tokens.get(token);
    if (seen !== undefined || this.tokens.size < MAX_TOKENS)
      this.tokens.set(token, (seen ?? 0) + 1);
  }

  /** Range of the values under a mark, end stops left out; null without a value. */
  range(mark: DecimalMark): { readonly min: number; readonly max: number } | null {
    const point = mark === ".";
    const parts: Extremes[] = [this.sure];
    if (this.eitherPoint !== null && this.eitherComma === null)
      parts.push(point ? this.ifDecimal : this.ifThousands);
    else if (this.eitherComma !== null) parts.push(point ? this.ifThousands : this.ifDecimal);
    const min = Math.min(...parts.map((part) => part.usualMin()));
    const max = Math.max(...parts.map((part) => part.usualMax()));
    return min <= max ? { min, max } : null;
  }
}

function place(row: RowTokeniser, index: number): Place {
  return { line: row.line, cell: row.cellText(index) };
}

/** Smallest and largest values with their counts and neighbours, so that end stops can be left out. */
class Extremes {
  private min = Infinity;
  private max = -Infinity;
  private secondMin = Infinity;
  private secondMax = -Infinity;
  private minCount = 0;
  private maxCount = 0;

  add(value: number): void {
    if (value < this.min) {
      this.secondMin = this.min;
      this.min = value;
      this.minCount = 1;
    } else if (value === this.min) this.minCount++;
    else if (value < this.secondMin) this.secondMin = value;
    if (value > this.max) {
      this.secondMax = this.max;
      this.max = value;
      this.maxCount = 1;
    } else if (value === this.max) this.maxCount++;
    else if (value > this.secondMax) this.secondMax = value;
  }

  usualMin(): number {
    return this.minCount > 1 && looksLikeEndStop(this.min) && this.secondMin <= this.max
      ? this.secondMin
      : this.min;
  }

  usualMax(): number {
    return this.maxCount > 1 && looksLikeEndStop(this.max) && this.secondMax >= this.min
      ? this.secondMax
      : this.max;
  }
}

/** Classifies the marks of a number in UTF-8 bytes without reading its value; see {@link MarkKind}. */
export function markKind(bytes: Uint8Array, from: number, to: number): number {
  let at = from;
  let end = to;
  while (at < end && bytes[at] === 32) at++;
  while (end > at && bytes[end - 1] === 32) end--;
  if (at < end && (bytes[at] === 45 || bytes[at] === 43)) at++;
  if (at >= end || end - at > 40) return MarkKind.noNumber;
  const firstDigit = bytes[at];
  let points = 0;
  let commas = 0;
  let lastMark = 0;
  let digits = 0;
  let digitsBeforeFirstMark = 0;
  let digitsSinceMark = 0;
  let spaced = false;
  let exponent = false;
  for (; at < end; at++) {
    const byte = bytes[at] as number;
    if (byte >= 48 && byte <= 57) {
      digits++;
      digitsSinceMark++;
    } else if (byte === POINT || byte === COMMA) {
      if (lastMark === 0) digitsBeforeFirstMark = digits;
      if (byte === POINT) points++;
      else commas++;
      lastMark = byte;
      digitsSinceMark = 0;
    } else if ((byte === 101 || byte === 69) && digits > 0) {
      exponent = true;
      break;
    } else if (byte === 32 || byte >= 0x80 || byte === 39) spaced = true;
    else if (byte !== 37) return MarkKind.noNumber;
  }
  if (digits === 0) return MarkKind.noNumber;
  if (lastMark === 0) return MarkKind.none;
  if (points > 0 && commas > 0)
    return lastMark === POINT ? MarkKind.provesPoint : MarkKind.provesComma;
  if (points > 1) return MarkKind.provesComma;
  if (commas > 1) return MarkKind.provesPoint;
  const isPoint = lastMark === POINT;
  const either =
    !exponent &&
    !spaced &&
    digitsSinceMark === 3 &&
    digitsBeforeFirstMark >= 1 &&
    digitsBeforeFirstMark <= 3 &&
    firstDigit !== 48;
  if (either) return isPoint ? MarkKind.eitherPoint : MarkKind.eitherComma;
  return isPoint ? MarkKind.provesPoint : MarkKind.provesComma;
}
