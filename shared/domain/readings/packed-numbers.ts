/**
 * A column of numbers as a chart travels: a third of the bytes of a JSON array, to the same digit.
 *
 * Each number is a whole number of its column's last decimal and is written as the difference from
 * the number before it (the first one from 0), as a Base64 VLQ: the sign in the last bit, then
 * groups of five bits, the least first, each one character of the base64 alphabet whose sixth bit
 * says that more follow (ECMA-426, the source map format). A full stop stands for a number that is
 * not known. Example: 6.4, 6.5, unknown, 6.4 with one decimal are 64, +1, unknown, −1: `gEC.D`.
 */
export interface PackedNumbers {
  readonly decimals: number;
  readonly differences: string;
}

const alphabet = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
const unknown = ".";
const valueOf = new Map(Array.from(alphabet, (character, value) => [character, value]));

/**
 * Packs numbers with at most `decimals` (0 to 9) decimals; further ones are rounded away. Null and
 * NaN are unknown. Whole numbers of the last decimal must stay within ±2^51.
 */
export function packNumbers(values: ArrayLike<number | null>, decimals: number): PackedNumbers {
  const scale = 10 ** decimals;
  let differences = "";
  let before = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    if (value === null || value === undefined || Number.isNaN(value)) {
      differences += unknown;
      continue;
    }
    const whole = Math.round(value * scale);
    differences += vlq(whole - before);
    before = whole;
  }
  return { decimals, differences };
}

/** Beyond 31 bits the bit operators wrap, so the groups go by division. */
function vlq(difference: number): string {
  let rest = difference < 0 ? -2 * difference + 1 : 2 * difference;
  let text = "";
  while (rest > 31) {
    text += alphabet[(rest % 32) + 32];
    rest = Math.floor(rest / 32);
  }
  return text + alphabet[rest];
}

/** What {@link packNumbers} packed, unknown as NaN. @throws RangeError for other characters. */
export function unpackNumbers({ decimals, differences }: PackedNumbers): Float64Array {
  const scale = 10 ** decimals;
  const values: number[] = [];
  let whole = 0;
  let sum = 0;
  let place = 1;
  for (const character of differences) {
    if (character === unknown) {
      values.push(NaN);
      continue;
    }
    const group = valueOf.get(character);
    if (group === undefined) throw new RangeError(`"${character}" is no part of a packed number`);
    sum += (group % 32) * place;
    place *= 32;
    if (group > 31) continue;
    whole += sum % 2 === 0 ? sum / 2 : -(sum - 1) / 2;
    // The quotient is the double nearest to the decimal number, as reading its text would give.
    values.push(whole / scale);
    sum = 0;
    place = 1;
  }
  if (place !== 1) throw new RangeError("packed numbers end within a number");
  return Float64Array.from(values);
}
