import type { DecimalMark } from "./recipe";
import { isNumericSentinel, isSentinelToken } from "./sentinels";

/** What a cell that should hold a number turned out to be. */
export const CellStatus = { number: 0, empty: 1, token: 2, unreadable: 3 } as const;
export type CellStatusCode = (typeof CellStatus)[keyof typeof CellStatus];

/** Longer cells are no numbers; only the first bytes of them are looked at. */
export const MAX_NUMBER_BYTES = 64;
/** Up to this many digits the digits and the power of ten are exact doubles, so one division rounds correctly. */
const EXACT_DIGITS = 15;

const POWERS_OF_TEN: readonly number[] = Array.from({ length: EXACT_DIGITS + 1 }, (_, i) =>
  Number(`1e${i}`),
);
const decoder = new TextDecoder("utf-8");

/**
 * Reads one number from UTF-8 bytes. The value equals `Number(text)` to the last bit, where `text` is the
 * cell with thousands separators removed and the decimal mark written as a point.
 *
 * Thousands may be set off by the other mark, by spaces (also no-break and narrow) or apostrophes, in groups
 * of three; anything else is unreadable, never a guess. Results stand in the fields until the next call.
 */
export class NumberCell {
  value = NaN;
  /** Digits after the decimal mark as written, an exponent accounted for; 0 to 15. */
  decimals = 0;
  status: CellStatusCode = CellStatus.empty;
  /** The cell as written; only set for tokens and unreadable cells. */
  text = "";

  parse(bytes: Uint8Array, from: number, to: number, mark: DecimalMark): CellStatusCode {
    const markByte = mark === "." ? 46 : 44;
    let at = from;
    let end = to;
    while (at < end && bytes[at] === 32) at++;
    while (end > at && bytes[end - 1] === 32) end--;
    if (at === end) {
      this.value = NaN;
      this.decimals = 0;
      this.text = "";
      return (this.status = CellStatus.empty);
    }
    let negative = false;
    const first = bytes[at] as number;
    if (first === 45) {
      negative = true;
      at++;
    } else if (first === 43) at++;
    const digitsFrom = at;
    let mantissa = 0;
    let markAt = -1;
    for (; at < end; at++) {
      const byte = bytes[at] as number;
      const digit = byte - 48;
      if (digit >= 0 && digit <= 9) mantissa = mantissa * 10 + digit;
      else if (byte === markByte && markAt < 0) markAt = at;
      else break;
    }
    const digits = at - digitsFrom - (markAt < 0 ? 0 : 1);
    if (at < end || digits === 0 || digits > EXACT_DIGITS) {
      return this.parseText(bytes, from, to, mark);
    }
    const decimals = markAt < 0 ? 0 : end - markAt - 1;
    const value = decimals === 0 ? mantissa : mantissa / (POWERS_OF_TEN[decimals] as number);
    this.value = negative ? -value : value;
    this.decimals = decimals;
    return (this.status = CellStatus.number);
  }

  /** The careful way for everything but a bare decimal. */
  private parseText(
    bytes: Uint8Array,
    from: number,
    to: number,
    mark: DecimalMark,
  ): CellStatusCode {
    const long = to - from > MAX_NUMBER_BYTES;
    const text = decoder.decode(bytes.subarray(from, long ? from + MAX_NUMBER_BYTES : to)).trim();
    this.value = NaN;
    this.decimals = 0;
    this.text = text;
    if (text === "") return (this.status = CellStatus.empty);
    if (!long) {
      const plain = plainNumberText(text, mark);
      if (plain !== null) {
        this.value = Number(plain);
        this.decimals = decimalsOf(plain);
        return (this.status = CellStatus.number);
      }
      if (isSentinelToken(text) || isSentinelInOtherMark(text, mark)) {
        return (this.status = CellStatus.token);
      }
    }
    return (this.status = CellStatus.unreadable);
  }
}

/** Firmware writes its "no reading" number with a point even where the readings have commas. */
function isSentinelInOtherMark(text: string, mark: DecimalMark): boolean {
  const plain = plainNumberText(text, mark === "." ? "," : ".");
  return plain !== null && isNumericSentinel(Number(plain));
}

/** Space, no-break space, narrow no-break space, thin space. */
const GROUP_SPACES = " \u00a0\u202f\u2009";
const APOSTROPHES = "'\u2019";

/**
 * The number written in `text` as JavaScript would write it, or null if it is not one number in this
 * convention: `1.234,5` with "," gives `1234.5`; with "." it gives null.
 */
export function plainNumberText(text: string, mark: DecimalMark): string | null {
  const otherMark = mark === "." ? "," : ".";
  let at = 0;
  let out = "";
  const sign = text[0];
  if (sign === "-" || sign === "\u2212") out = "-";
  if (sign === "-" || sign === "+" || sign === "\u2212") at = 1;
  while (at < text.length && GROUP_SPACES.includes(text[at] as string)) at++;

  let group = "";
  let groupMark = "";
  let integerDigits = "";
  let valid = true;
  for (; at < text.length; at++) {
    const c = text[at] as string;
    if (isDigit(c)) {
      group += c;
      continue;
    }
    const isGroupMark = c === otherMark || GROUP_SPACES.includes(c) || APOSTROPHES.includes(c);
    if (!isGroupMark || !isDigit(text[at + 1] ?? "")) break;
    valid =
      valid &&
      (groupMark === ""
        ? group.length >= 1 && group.length <= 3
        : c === groupMark && group.length === 3);
    groupMark = c;
    integerDigits += group;
    group = "";
  }
  if (groupMark !== "" && group.length !== 3) valid = false;
  integerDigits += group;

  let fraction = "";
  if (text[at] === mark) {
    at++;
    while (at < text.length && isDigit(text[at] as string)) fraction += text[at++];
  }
  if (!valid || integerDigits.length + fraction.length === 0) return null;
  out += integerDigits === "" ? "0" : integerDigits;
  if (fraction !== "") out += `.${fraction}`;

  if ((text[at] === "e" || text[at] === "E") && at + 1 < text.length) {
    let exponent = "";
    at++;
    if (text[at] === "+" || text[at] === "-") exponent = text[at++] === "-" ? "-" : "";
    const digitsAt = at;
    while (at < text.length && isDigit(text[at] as string)) exponent += text[at++];
    if (at === digitsAt || at - digitsAt > 3) return null;
    out += `e${exponent}`;
  }
  // A percent sign after the number repeats what the column says.
  while (at < text.length && GROUP_SPACES.includes(text[at] as string)) at++;
  if (text[at] === "%") at++;
  return at === text.length ? out : null;
}

function isDigit(c: string): boolean {
  return c >= "0" && c <= "9" && c.length === 1;
}

function decimalsOf(plain: string): number {
  const [mantissa = "", exponent = "0"] = plain.split("e");
  const point = mantissa.indexOf(".");
  const written = point < 0 ? 0 : mantissa.length - point - 1;
  return Math.min(EXACT_DIGITS, Math.max(0, written - Number(exponent)));
}
