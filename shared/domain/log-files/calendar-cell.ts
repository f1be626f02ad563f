import { readDateWords } from "./date-words";
import { DATE_ORDERS, dayMsOf, OrderBit } from "./date-orders";
import type { DateOrder } from "./recipe";

const MS_PER_DAY = 86_400_000;
/** No timestamp is longer; longer cells are something else. */
const MAX_BYTES = 64;

const MAX_PREFIX_BYTES = 10;

const decoder = new TextDecoder("utf-8");
const encoder = new TextEncoder();

/**
 * Splits one calendar timestamp into its fields without deciding the order of day, month and year.
 *
 * Understands dates with `/ - .` or spaces, month names, compact `20250715T120000`, times with `:` or `.`,
 * fractions of a second, AM/PM, `24:00`, and a trailing `Z`, `UTC` or offset. Date alone and time alone are
 * fine too. The same code serves recognition and reading, so the two cannot disagree.
 * Results stand in the fields until the next call.
 */
export class CalendarCell {
  hasDate = false;
  hasTime = false;
  first = 0;
  second = 0;
  third = 0;
  firstDigits = 0;
  secondDigits = 0;
  thirdDigits = 0;
  /** Which field is written as a name, or -1. */
  namedField: -1 | 0 | 1 = -1;
  /** Milliseconds since midnight, 0 to 86,400,000 (24:00). */
  timeOfDayMs = 0;
  /** The hour as written, and whether AM or PM stood after it. */
  writtenHour = 0;
  hasHalfDayMark = false;
  /** Offset from UTC as written in the cell; null without one. */
  offsetMinutes: number | null = null;

  private bytes: Uint8Array = new Uint8Array(0);
  private at = 0;
  private end = 0;
  private digits = 0;
  /** The date as written in the last cell that had one in figures; its fields are still in place. */
  private readonly prefix = new Uint8Array(MAX_PREFIX_BYTES);
  private prefixLength = 0;
  private prefixOffset = 0;
  private cachedFirst = -1;
  private cachedSecond = -1;
  private cachedThird = -1;
  private cachedOrder: DateOrder | null = null;
  private cachedDayMs = 0;

  /** True if the whole cell is a date, a time, or both. */
  parse(bytes: Uint8Array, from: number, to: number): boolean {
    this.hasDate = false;
    this.hasTime = false;
    this.namedField = -1;
    this.timeOfDayMs = 0;
    this.hasHalfDayMark = false;
    this.offsetMinutes = null;
    if (to - from > MAX_BYTES) return false;
    this.bytes = bytes;
    this.at = from;
    this.end = to;
    this.skipSpaces();
    while (this.end > this.at && bytes[this.end - 1] === 32) this.end--;
    const start = this.at;
    this.prefixOffset = start - from;
    if (start >= this.end) return false;
    if (this.prefixLength > 0 && this.hasSameDate(start)) {
      this.hasDate = true;
      return this.parseAfterDate();
    }
    const value = this.readDigits();
    if (this.digits >= 8) return this.parseCompact(start);
    const separator = bytes[this.at];
    if (this.digits > 0 && separator === 58) {
      this.at = start;
      return this.parseTime();
    }
    if (
      this.digits > 0 &&
      this.at < this.end &&
      (separator === 47 || separator === 45 || separator === 46)
    ) {
      this.first = value;
      this.firstDigits = this.digits;
      this.at++;
      this.second = this.readDigits();
      this.secondDigits = this.digits;
      if (this.digits > 0 && this.at < this.end && bytes[this.at] === separator) {
        this.at++;
        this.third = this.readDigits();
        this.thirdDigits = this.digits;
        if (this.digits > 0) {
          this.hasDate = true;
          this.keepPrefix(start);
          return this.parseAfterDate();
        }
      }
    }
    this.at = start;
    return this.parseWords();
  }

  /** Most rows repeat the date of the row before: comparing ten bytes costs less than reading them. */
  private hasSameDate(start: number): boolean {
    const { prefix, prefixLength, bytes } = this;
    const next = start + prefixLength;
    if (next > this.end) return false;
    for (let i = 0; i < prefixLength; i++) if (bytes[start + i] !== prefix[i]) return false;
    if (next < this.end && isDigitByte(bytes[next] as number)) return false;
    this.at = next;
    return true;
  }

  private keepPrefix(start: number): void {
    const length = this.at - start;
    this.prefixLength = length <= MAX_PREFIX_BYTES ? length : 0;
    for (let i = 0; i < this.prefixLength; i++) this.prefix[i] = this.bytes[start + i] as number;
  }

  /** Bytes of the date at the very start of the cell last read; 0 for dates with names or spaces before them. */
  get datePrefixLength(): number {
    return this.prefixOffset === 0 ? this.prefixLength : 0;
  }

  /** Bits of {@link OrderBit} under which the date exists; 0 without a date or for one like 31/31/2025. */
  orderMask(): number {
    if (!this.hasDate) return 0;
    let mask = 0;
    for (const order of DATE_ORDERS) if (this.dayMs(order) !== null) mask |= OrderBit[order];
    return mask;
  }

  /** Midnight of the date as if its zone were UTC, or null if there is no such date in this order. */
  dayMs(order: DateOrder): number | null {
    const isCached =
      this.first === this.cachedFirst &&
      this.second === this.cachedSecond &&
      this.third === this.cachedThird &&
      order === this.cachedOrder &&
      this.namedField < 0;
    if (isCached) return this.cachedDayMs;
    const dayMs = dayMsOf(this, order);
    if (dayMs !== null && this.namedField < 0) {
      this.cachedFirst = this.first;
      this.cachedSecond = this.second;
      this.cachedThird = this.third;
      this.cachedOrder = order;
      this.cachedDayMs = dayMs;
    }
    return dayMs;
  }

  private readDigits(): number {
    let value = 0;
    const start = this.at;
    while (this.at < this.end) {
      const digit = (this.bytes[this.at] as number) - 48;
      if (digit < 0 || digit > 9) break;
      value = value * 10 + digit;
      this.at++;
    }
    this.digits = this.at - start;
    return value;
  }

  /** Spaces of all kinds: newer formatters put U+202F before AM and PM. */
  private skipSpaces(): void {
    const { bytes } = this;
    while (this.at < this.end) {
      const byte = bytes[this.at];
      if (byte === 32) this.at++;
      else if (byte === 0xc2 && bytes[this.at + 1] === 0xa0) this.at += 2;
      else if (byte === 0xe2 && bytes[this.at + 1] === 0x80 && bytes[this.at + 2] === 0xaf)
        this.at += 3;
      else break;
    }
  }

  private parseAfterDate(): boolean {
    if (this.at >= this.end) return true;
    const byte = this.bytes[this.at] as number;
    // T, t, comma or underscore between date and time; spaces may follow.
    if (byte === 84 || byte === 116 || byte === 44 || byte === 95) this.at++;
    else if (byte !== 32 && byte !== 0xc2 && byte !== 0xe2) return false;
    this.skipSpaces();
    return this.at < this.end && this.parseTime();
  }

  private parseCompact(start: number): boolean {
    this.prefixLength = 0;
    const length = this.digits;
    const two = (offset: number): number =>
      ((this.bytes[start + offset] as number) - 48) * 10 +
      (this.bytes[start + offset + 1] as number) -
      48;
    if (length !== 8 && length !== 12 && length !== 14) return false;
    this.first = two(0) * 100 + two(2);
    this.second = two(4);
    this.third = two(6);
    this.firstDigits = 4;
    this.secondDigits = 2;
    this.thirdDigits = 2;
    this.hasDate = true;
    if (length > 8) {
      this.hasTime = true;
      return this.setTime(two(8), two(10), length === 14 ? two(12) : 0, 0) && this.parseTail();
    }
    if (this.at >= this.end) return true;
    const byte = this.bytes[this.at];
    if (byte !== 84 && byte !== 116 && byte !== 32 && byte !== 95 && byte !== 45) return false;
    this.at++;
    const timeStart = this.at;
    this.readDigits();
    if (this.digits === 4 || this.digits === 6) {
      const offset = timeStart - start;
      this.hasTime = true;
      return (
        this.setTime(two(offset), two(offset + 2), this.digits === 6 ? two(offset + 4) : 0, 0) &&
        this.parseTail()
      );
    }
    this.at = timeStart;
    return this.parseTime();
  }

  private parseTime(): boolean {
    const { bytes } = this;
    this.hasTime = true;
    const hour = this.readDigits();
    const hourDigits = this.digits;
    if (hourDigits === 0 || hourDigits > 2 || this.at >= this.end) return false;
    const separator = bytes[this.at];
    if (separator !== 58 && separator !== 46) return false;
    this.at++;
    const minute = this.readDigits();
    if (this.digits !== 2) return false;
    let second = 0;
    let fraction = 0;
    if (this.at < this.end && bytes[this.at] === separator) {
      this.at++;
      second = this.readDigits();
      if (this.digits !== 2) return false;
      if (
        this.at < this.end &&
        (bytes[this.at] === 46 || bytes[this.at] === 44 || bytes[this.at] === 58)
      ) {
        this.at++;
        const start = this.at;
        const fractionDigits = this.readDigits();
        const count = this.at - start;
        if (count === 0 || count > 12) return false;
        fraction = Math.round((fractionDigits / 10 ** count) * 1000);
      }
    }
    return this.setTime(hour, minute, second, fraction) && this.parseTail();
  }

  private setTime(hour: number, minute: number, second: number, ms: number): boolean {
    this.writtenHour = hour;
    this.timeOfDayMs = ((hour * 60 + minute) * 60 + second) * 1000 + ms;
    return hour <= 24 && minute < 60 && second < 60 && this.timeOfDayMs <= MS_PER_DAY;
  }

  /** AM or PM, then Z or an offset, then nothing more. */
  private parseTail(): boolean {
    if (this.at >= this.end) return true;
    this.skipSpaces();
    const { bytes } = this;
    const letter = (bytes[this.at] as number) | 32;
    if (letter === 97 || letter === 112) {
      let next = this.at + 1;
      if (bytes[next] === 46) next++;
      if (((bytes[next] as number) | 32) !== 109 || next >= this.end) return false;
      next++;
      if (bytes[next] === 46 && next < this.end) next++;
      this.at = next;
      if (!this.applyHalfDay(letter === 112)) return false;
      this.skipSpaces();
    }
    return this.at >= this.end || this.parseOffset();
  }

  private applyHalfDay(isAfternoon: boolean): boolean {
    const hour = this.writtenHour;
    this.hasHalfDayMark = true;
    if (hour > 12) return isAfternoon && hour < 24;
    if (hour === 12 && !isAfternoon) this.timeOfDayMs -= MS_PER_DAY / 2;
    else if (hour < 12 && isAfternoon) this.timeOfDayMs += MS_PER_DAY / 2;
    return true;
  }

  private parseOffset(): boolean {
    const { bytes } = this;
    const byte = bytes[this.at] as number;
    if (byte === 43 || byte === 45) {
      const stands = bytes[this.at - 1] === 32;
      this.at++;
      const hours = this.readDigits();
      const digits = this.digits;
      let minutes = 0;
      let total = hours;
      if (digits === 4) {
        total = Math.floor(hours / 100);
        minutes = hours % 100;
      } else if (digits === 2 || digits === 1) {
        if (this.at < this.end && bytes[this.at] === 58) {
          this.at++;
          minutes = this.readDigits();
          if (this.digits !== 2) return false;
        } else if (stands || digits === 1) {
          // After a space, −5 is a reading whose decimal comma was taken for a separator.
          return false;
        }
      } else return false;
      if (total > 18 || minutes > 59) return false;
      this.offsetMinutes = (total * 60 + minutes) * (byte === 45 ? -1 : 1);
      return this.at === this.end;
    }
    const word = decoder.decode(bytes.subarray(this.at, this.end)).toUpperCase();
    if (word !== "Z" && word !== "UTC" && word !== "GMT") return false;
    this.offsetMinutes = 0;
    return true;
  }

  /** Dates with a month name, or with spaces between the fields: `15. Juli 2025 12:00`, `Jul 15, 2025`. */
  private parseWords(): boolean {
    this.prefixLength = 0;
    const found = readDateWords(decoder.decode(this.bytes.subarray(this.at, this.end)));
    if (found === null) return false;
    [this.first, this.second, this.third] = found.fields;
    [this.firstDigits, this.secondDigits, this.thirdDigits] = found.digits;
    this.namedField = found.namedField;
    this.hasDate = true;
    if (found.timeText === "") return true;
    // What comes after the date may hold spaces of several bytes, so its place counts from the end.
    this.at = this.end - encoder.encode(found.timeText).length;
    return this.parseTime();
  }
}

function isDigitByte(byte: number): boolean {
  return byte >= 48 && byte <= 57;
}
