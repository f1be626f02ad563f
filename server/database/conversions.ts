/**
 * The one place where values of the database become values of the product and back.
 *
 * BIGINT ids and COUNT(*) come as text, because a double cannot hold every 64-bit number; DECIMAL
 * comes as text for the same reason. Instants are DATE(3) columns and `Date` objects; answers carry
 * them as ISO 8601 in UTC.
 */

/** Connector options without which BIGINT and DECIMAL are silently rounded. */
export const exactNumbers = { supportBigNumbers: true, bigNumberStrings: true } as const;

export function instantText(at: Date): string {
  return at.toISOString();
}

export function instantTextOrNull(at: Date | null): string | null {
  return at === null ? null : at.toISOString();
}

/**
 * A count or another whole number read by raw SQL.
 * @throws RangeError where a double could not hold it.
 */
export function wholeNumber(value: string | number | bigint): number {
  const number = Number(value);
  if (!Number.isSafeInteger(number)) throw new RangeError(`not a safe whole number: ${value}`);
  return number;
}

/** A DECIMAL or DOUBLE read from a row; null stays null, because unknown is not zero. */
export function decimalNumber(value: string | number | null): number | null {
  if (value === null) return null;
  const number = Number(value);
  if (!Number.isFinite(number)) throw new RangeError(`not a number: ${value}`);
  return number;
}
