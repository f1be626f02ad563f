import { isWeekday, monthOf } from "./month-names";

/** A date with a name in it, split into fields as they stand; the order of the fields is not decided here. */
export interface DateWords {
  readonly fields: readonly [number, number, number];
  readonly digits: readonly [number, number, number];
  /** Which field is the month's name. */
  readonly namedField: 0 | 1;
  /** The time after the date; "" without one. */
  readonly timeText: string;
}

const ORDINALS: ReadonlySet<string> = new Set(["st", "nd", "rd", "th"]);

/** Reads `15. Juli 2025 12:00`, `Jul 15, 2025`, `Tue 15-Jul-25`; null for anything else. */
export function readDateWords(text: string): DateWords | null {
  const colon = text.indexOf(":");
  let timeAt = colon < 0 ? text.length : colon;
  while (colon >= 0 && timeAt > 0 && isDigit(text[timeAt - 1] as string)) timeAt--;
  const words = splitWords(text.slice(0, timeAt));
  if (words === null) return null;
  const parts = words.filter((word, i) => !isBeside(word, i === words.length - 1));
  const [a, b, c] = parts;
  if (parts.length !== 3 || a === undefined || b === undefined || c === undefined) return null;
  const namedField = monthOf(a) > 0 ? 0 : monthOf(b) > 0 ? 1 : null;
  if (namedField === null) return null;
  const value = (word: string): number => (isDigit(word[0] as string) ? Number(word) : NaN);
  const fields: [number, number, number] =
    namedField === 0 ? [monthOf(a), value(b), value(c)] : [value(a), monthOf(b), value(c)];
  if (fields.some(Number.isNaN)) return null;
  // A name counts as two digits: it says nothing about where the year stands.
  const digits: [number, number, number] =
    namedField === 0 ? [2, b.length, c.length] : [a.length, 2, c.length];
  return { fields, digits, namedField, timeText: text.slice(timeAt) };
}

/** Weekdays, ordinal endings and the T before a time stand beside the date. */
function isBeside(word: string, isLast: boolean): boolean {
  return isWeekday(word) || ORDINALS.has(word) || (isLast && word === "t");
}

function isDigit(c: string): boolean {
  return c >= "0" && c <= "9";
}

function isLetter(c: string): boolean {
  return c.toLowerCase() !== c.toUpperCase();
}

/** Lower-case runs of letters and of digits; null if anything but plain punctuation stands between. */
function splitWords(text: string): string[] | null {
  const words: string[] = [];
  let word = "";
  let wordIsDigits = false;
  for (const c of text) {
    const digit = isDigit(c);
    if (digit || isLetter(c)) {
      if (word !== "" && digit !== wordIsDigits) {
        words.push(word);
        word = "";
      }
      word += c.toLowerCase();
      wordIsDigits = digit;
    } else {
      if (!" .,-/\u00a0\u202f".includes(c)) return null;
      if (word !== "") words.push(word);
      word = "";
    }
  }
  if (word !== "") words.push(word);
  return words;
}
