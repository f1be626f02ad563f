import { isChannelMeaning } from "./column-units";
import type { FileRecipe } from "./recipe";
import type { RowStore } from "./row-store";

/** Reads rows ahead of the tokeniser, straight from the bytes. */
export interface RowsAhead {
  /** Comes before every stretch of bytes that {@link readFrom} is asked about. */
  begin(bytes: Uint8Array): void;
  /**
   * Reads whole rows from `from` on, as many as it can; returns where the next row starts. `line` is the
   * number of the row at `from`; each row read is one line.
   */
  readFrom(bytes: Uint8Array, from: number, line: number): number;
  /** Lines read by the last {@link readFrom}. */
  readonly linesRead: number;
}

const MS_PER_HOUR = 3_600_000;
const MS_PER_MINUTE = 60_000;
const MAX_PREFIX_BYTES = 10;
const MAX_EXACT_DIGITS = 15;
const POWERS_OF_TEN = Float64Array.from({ length: MAX_EXACT_DIGITS + 1 }, (_, i) =>
  Number(`1e${i}`),
);
/** After this many rows in a row that were not plain, the file is left to the careful way. */
const MAX_MISSES = 200;

const SKIP = -1;
const TIME = -2;
const DATE = -3;
const TIME_OF_DAY = -4;

/**
 * The fast way for rows without surprises: the date written as in the row before, a time `hh:mm[:ss]` with or
 * without Z, bare decimals, the usual number of cells. Anything else, be it a word, a space, a new day or a
 * torn row, is not touched and left to the careful way, which must give the same for plain rows.
 */
export class PlainRows implements RowsAhead {
  linesRead = 0;
  /** While false (lines wait to be told row from footer) no row is taken. */
  isAllowed = true;

  private readonly separator: number;
  /** By column: the channel, or one of the codes above. */
  private readonly plan: Int8Array;
  private readonly marks: Uint8Array;
  /** Of the row being read, by channel. */
  private readonly rowDecimals: Uint8Array;
  private readonly firstDataLine: number;
  private readonly prefix = new Uint8Array(MAX_PREFIX_BYTES);
  private prefixLength = 0;
  private dayMs = 0;
  private misses = 0;
  private lastLineFeed = -1;

  constructor(
    recipe: FileRecipe,
    private readonly store: RowStore,
  ) {
    this.separator = recipe.dialect.separator.charCodeAt(0);
    this.firstDataLine = recipe.dialect.firstDataLine;
    const columnCount = recipe.columns.reduce((most, { index }) => Math.max(most, index + 1), 0);
    this.plan = new Int8Array(columnCount).fill(SKIP);
    const isSplit = recipe.columns.some(({ meaning }) => meaning === "timeOfDay");
    for (const { index, meaning } of recipe.columns) {
      if (meaning === "time" || (meaning === "date" && !isSplit)) this.plan[index] = TIME;
      else if (meaning === "date") this.plan[index] = DATE;
      else if (meaning === "timeOfDay") this.plan[index] = TIME_OF_DAY;
    }
    store.channels.forEach(({ index }, k) => (this.plan[index] = k));
    this.rowDecimals = new Uint8Array(store.channels.length);
    this.marks = Uint8Array.from(store.channels, ({ mark }) => mark.charCodeAt(0));
  }

  /** Only for files whose rows can be plain: no quotes, no collapsing spaces, calendar times. */
  static suits({ dialect, columns, time }: FileRecipe): boolean {
    const times = columns.filter(({ meaning }) => meaning === "time").length;
    const splits = columns.filter(
      ({ meaning }) => meaning === "date" || meaning === "timeOfDay",
    ).length;
    const channels = columns.filter(({ meaning }) => isChannelMeaning(meaning)).length;
    return (
      dialect.quote === null &&
      dialect.separator !== " " &&
      time.format.kind === "calendar" &&
      times + Math.sign(splits) === 1 &&
      splits <= 2 &&
      // Words are read with care, even where they are figures.
      !columns.some(({ meaning }) => meaning === "status") &&
      channels < 100
    );
  }

  /** Takes the date of a row that the careful way has read as the one to expect next. */
  learn(bytes: Uint8Array, from: number, length: number, dayMs: number): void {
    this.prefixLength = length <= MAX_PREFIX_BYTES ? length : 0;
    for (let i = 0; i < this.prefixLength; i++) this.prefix[i] = bytes[from + i] as number;
    this.dayMs = dayMs;
  }

  begin(bytes: Uint8Array): void {
    this.lastLineFeed = bytes.lastIndexOf(10);
  }

  readFrom(bytes: Uint8Array, from: number, line: number): number {
    this.linesRead = 0;
    if (
      !this.isAllowed ||
      this.prefixLength === 0 ||
      this.misses > MAX_MISSES ||
      line < this.firstDataLine
    )
      return from;
    let at = from;
    // Every look at a byte stops at a line feed, so rows before the last one never look past the end.
    while (at <= this.lastLineFeed) {
      const next = this.readRow(bytes, at, line + this.linesRead);
      if (next < 0) break;
      at = next;
      this.linesRead++;
    }
    this.misses = this.linesRead > 0 ? 0 : this.misses + 1;
    return at;
  }

  /** Start of the next row, or -1 if this one is not plain. A row is counted only when all of it was. */
  private readRow(bytes: Uint8Array, from: number, line: number): number {
    const { plan, separator, store, marks } = this;
    const { channels, rowCount } = store;
    const last = plan.length - 1;
    if (rowCount === store.capacity) store.grow();
    let at = from;
    let timeOfDayMs = 0;
    let isUtc = 0;
    for (let column = 0; column <= last; column++) {
      const role = plan[column] as number;
      if (role >= 0) {
        let negative = false;
        if (bytes[at] === 45) {
          negative = true;
          at++;
        }
        const mark = marks[role] as number;
        const start = at;
        let mantissa = 0;
        let digit = (bytes[at] as number) - 48;
        while (digit >= 0 && digit <= 9) {
          mantissa = mantissa * 10 + digit;
          digit = (bytes[++at] as number) - 48;
        }
        let digits = at - start;
        let decimals = 0;
        if (bytes[at] === mark) {
          const fraction = ++at;
          digit = (bytes[at] as number) - 48;
          while (digit >= 0 && digit <= 9) {
            mantissa = mantissa * 10 + digit;
            digit = (bytes[++at] as number) - 48;
          }
          decimals = at - fraction;
          digits += decimals;
        }
        if (digits === 0 || digits > MAX_EXACT_DIGITS) return -1;
        const value = decimals === 0 ? mantissa : mantissa / (POWERS_OF_TEN[decimals] as number);
        const channel = channels[role] as (typeof channels)[number];
        channel.values[rowCount] = negative ? -value : value;
        // A row that turns out not to be plain must leave no trace.
        this.rowDecimals[role] = decimals;
      } else if (role === SKIP) {
        let byte = bytes[at];
        while (byte !== separator && byte !== 10 && byte !== 13) byte = bytes[++at];
      } else {
        if (role !== TIME_OF_DAY) {
          const { prefix, prefixLength } = this;
          for (let i = 0; i < prefixLength; i++) if (bytes[at + i] !== prefix[i]) return -1;
          at += prefixLength;
        }
        if (role !== DATE) {
          if (role === TIME) {
            if (bytes[at] !== 32 && bytes[at] !== 84) return -1;
            at++;
          }
          const hour = twoDigits(bytes, at);
          if (hour < 0 || hour > 23 || bytes[at + 2] !== 58) return -1;
          const minute = twoDigits(bytes, at + 3);
          if (minute < 0 || minute > 59) return -1;
          at += 5;
          timeOfDayMs = hour * MS_PER_HOUR + minute * MS_PER_MINUTE;
          if (bytes[at] === 58) {
            const second = twoDigits(bytes, at + 1);
            if (second < 0 || second > 59) return -1;
            timeOfDayMs += second * 1000;
            at += 3;
          }
          if (bytes[at] === 90) {
            isUtc = 1;
            at++;
          }
        }
      }
      if (column < last) {
        if (bytes[at] !== separator) return -1;
        at++;
      }
    }
    if (bytes[at] === 13 && bytes[at + 1] === 10) at++;
    if (bytes[at] !== 10) return -1;
    for (let k = 0; k < channels.length; k++) {
      const channel = channels[k] as (typeof channels)[number];
      const decimals = this.rowDecimals[k] as number;
      if (decimals > channel.decimals) channel.decimals = decimals;
    }
    store.timeMs[rowCount] = this.dayMs + timeOfDayMs;
    store.isUtc[rowCount] = isUtc;
    store.lines[rowCount] = line;
    store.rowCount = rowCount + 1;
    return at + 1;
  }
}

/** Two digits at a place as a number, negative where there are none; looks no further than the first other byte. */
export function twoDigits(bytes: Uint8Array, at: number): number {
  const tens = (bytes[at] as number) - 48;
  if (tens < 0 || tens > 9) return -1;
  const ones = (bytes[at + 1] as number) - 48;
  return ones < 0 || ones > 9 ? -1 : tens * 10 + ones;
}
