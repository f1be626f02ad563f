/**
 * Ways loggers write "no reading". A sentinel is a missing reading, never zero.
 *
 * Sources: -9999 and its kin, OL, #N/A and ±9.9E37 (the "not a number" and "infinity" of the SCPI command
 * standard, volume 1, 7.2.1) are common practice across loggers and spreadsheets; the list is ours.
 */
const TOKENS: ReadonlySet<string> = new Set([
  "ol",
  "o.l",
  "o.l.",
  "ovl",
  "ovfl",
  "ovrld",
  "overload",
  "over",
  "under",
  "ovr",
  "udr",
  "overflow",
  "underflow",
  "overrange",
  "underrange",
  "over range",
  "under range",
  "out of range",
  "nan",
  "qnan",
  "1.#qnan",
  "1.#ind",
  "inf",
  "infinity",
  "null",
  "nil",
  "none",
  "void",
  "missing",
  "na",
  "n/a",
  "n.a",
  "n.a.",
  "n.v.",
  "k.a.",
  "nd",
  "n.d.",
  "#n/a",
  "#n/v",
  "#nv",
  "#na",
  "#value!",
  "#wert!",
  "#div/0!",
  "#ref!",
  "#null!",
  "#num!",
  "#zahl!",
  "#name?",
  "no data",
  "nodata",
  "no_data",
  "no reading",
  "no signal",
  "no value",
  "no echo",
  "keine daten",
  "kein wert",
  "kein signal",
  "ungültig",
  "fehler",
  "pas de données",
  "erreur",
  "err",
  "error",
  "err.",
  "fault",
  "fail",
  "failed",
  "bad",
  "invalid",
  "inv",
  "lost",
  "los",
  "open",
  "short",
  "offline",
  "disconnected",
  "not connected",
  "?",
  "??",
  "???",
  "x",
  "xxx",
  "xxxx",
]);

/** True for text that stands for "no reading", whatever its case and sign: `OL`, `+OL`, `---`, `#N/A`. */
export function isSentinelToken(text: string): boolean {
  const lower = text.toLowerCase();
  if (TOKENS.has(lower)) return true;
  const first = lower[0];
  if ((first === "+" || first === "-") && TOKENS.has(lower.slice(1))) return true;
  return isFiller(lower);
}

/** Dashes, stars and hashes in the place of digits: `---`, `--.-`, `****`, `#####`. */
function isFiller(text: string): boolean {
  let fillers = 0;
  for (const c of text) {
    if ("-–—*#_".includes(c)) fillers++;
    else if (c !== "." && c !== "," && c !== ":" && c !== " ") return false;
  }
  return fillers > 0;
}

/** Numbers between these are never on the list. */
export const LOWEST_USUAL = -999;
export const HIGHEST_USUAL = 9e36;

const NUMBERS: ReadonlySet<number> = new Set([
  -999, -999.9, -999.99, -9999, -9999.9, -9999.99, -9999.999, -99999, -99999.9, -999999,
]);

/** True for numbers that no loop can show and loggers use for "no reading", in any unit. */
export function isNumericSentinel(value: number): boolean {
  if (value > LOWEST_USUAL && value < HIGHEST_USUAL) return false;
  return NUMBERS.has(value) || Math.abs(value) >= HIGHEST_USUAL;
}

/** How a numeric sentinel is named in a count: `-9999`, `9.9E37`. */
export function sentinelName(value: number): string {
  if (Math.abs(value) < 1e15) return String(value);
  return value.toExponential().toUpperCase().replace("E+", "E");
}

/** Full-scale counts of 16- and 32-bit converters, also with one or two implied decimals. */
const FULL_SCALES: readonly number[] = [
  32767, 32768, 65534, 65535, 2147483647, 2147483648, 4294967295,
];

/**
 * True for values that look like a converter's end stop or a display filled with nines: 3276.7, 65535, 999.9, 8888.
 * Only a hint: see {@link findRepeatedExtreme}.
 */
export function looksLikeEndStop(value: number): boolean {
  const magnitude = Math.abs(value);
  const digits = String(magnitude).replace(".", "");
  if (digits.length >= 3 && isRunOf(digits, "9")) return true;
  if (digits.length >= 4 && isRunOf(digits, "8")) return true;
  return FULL_SCALES.some(
    (scale) => magnitude === scale || magnitude === scale / 10 || magnitude === scale / 100,
  );
}

function isRunOf(digits: string, digit: string): boolean {
  for (const c of digits) if (c !== digit) return false;
  return true;
}

/** An extreme is a sentinel only when it stands this many times the spread of all other values away from them. */
const FAR_AWAY = 3;
const MIN_REPEATS = 3;

/**
 * Values at the ends of a column that mean "no reading" though no list names them: repeated at least
 * three times, looking like an end stop or outside `possible`, and far from every other value.
 * `values` may hold NaN. At most two on each side are found. Zero is never one: pumps stop.
 */
export function findRepeatedExtremes(
  values: Float64Array,
  possible: { readonly min: number; readonly max: number },
): readonly number[] {
  const found: number[] = [];
  for (let pass = 0; pass < 4; pass++) {
    const ends = columnEnds(values, found);
    if (ends === null) break;
    const candidate = [ends.max, ends.min].find((end) => isFarEnd(end, possible));
    if (candidate === undefined) break;
    found.push(candidate.value);
  }
  return found;
}

interface ColumnEnd {
  readonly value: number;
  readonly count: number;
  /** The nearest other value, and the spread of all the others. */
  readonly next: number;
  readonly othersSpread: number;
}

function isFarEnd(
  end: ColumnEnd,
  possible: { readonly min: number; readonly max: number },
): boolean {
  if (end.count < MIN_REPEATS || end.value === 0 || Number.isNaN(end.next)) return false;
  const impossible = end.value < possible.min || end.value > possible.max;
  if (!impossible && !looksLikeEndStop(end.value)) return false;
  return Math.abs(end.value - end.next) > FAR_AWAY * end.othersSpread;
}

function columnEnds(
  values: Float64Array,
  skip: readonly number[],
): { min: ColumnEnd; max: ColumnEnd } | null {
  let min = Infinity;
  let max = -Infinity;
  let secondMin = Infinity;
  let secondMax = -Infinity;
  let minCount = 0;
  let maxCount = 0;
  for (let i = 0; i < values.length; i++) {
    const v = values[i] as number;
    // Spelled out because this loop runs over every reading: NaN, and the range of the list.
    if (!(v > LOWEST_USUAL && v < HIGHEST_USUAL) && (v !== v || isNumericSentinel(v))) continue;
    if (skip.length > 0 && skip.includes(v)) continue;
    if (v < min) {
      secondMin = min;
      min = v;
      minCount = 1;
    } else if (v === min) minCount++;
    else if (v < secondMin) secondMin = v;
    if (v > max) {
      secondMax = max;
      max = v;
      maxCount = 1;
    } else if (v === max) maxCount++;
    else if (v > secondMax) secondMax = v;
  }
  if (min >= max) return null;
  return {
    min: { value: min, count: minCount, next: secondMin, othersSpread: max - secondMin },
    max: { value: max, count: maxCount, next: secondMax, othersSpread: secondMax - min },
  };
}
