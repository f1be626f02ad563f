import type { BathReading } from "@shared/domain/uncertainty/bath-check";

export interface ReadPairs {
  readonly pairs: readonly BathReading[];
  /** Numbers of lines, from 1, that are not two numbers. */
  readonly unreadable: readonly number[];
}

/**
 * Paired readings as typed or pasted, one pair a line: two numbers with a tab, semicolon, blank or
 * comma between them; point or comma before decimals, but a comma not both. Empty lines are passed.
 * Example: "4,11;4,00" and "4.11, 4.00" are both 4.11 and 4.00 °C.
 */
export function readPairs(text: string): ReadPairs {
  const pairs: BathReading[] = [];
  const unreadable: number[] = [];
  for (const [at, line] of text.split(/\r?\n/).entries()) {
    if (line.trim() === "") continue;
    const pair = readPair(line.trim());
    if (pair === null) unreadable.push(at + 1);
    else pairs.push(pair);
  }
  return { pairs, unreadable };
}

function readPair(line: string): BathReading | null {
  const apart = line.split(/[\t;]\s*|\s+/).filter((part) => part !== "");
  // "4.11, 4.00": the comma stands between, since the numbers have points of their own.
  const stripped = apart.map((part) => part.replace(/,$/, ""));
  const parts = stripped.length === 1 ? (stripped[0] ?? "").split(",") : stripped;
  if (parts.length !== 2) return null;
  const [firstC, secondC] = parts.map(readNumber);
  return firstC == null || secondC == null ? null : { firstC, secondC };
}

function readNumber(text: string): number | null {
  return /^[-−+]?\d{1,3}([.,]\d{1,6})?$/.test(text)
    ? Number(text.replace(",", ".").replace("−", "-"))
    : null;
}

/** Pairs as lines of the field, to correct a check from. */
export function writePairs(pairs: readonly BathReading[]): string {
  return pairs.map(({ firstC, secondC }) => `${firstC}\t${secondC}`).join("\n");
}
