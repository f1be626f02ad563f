import { cellKind, isDateLike, type CellKind } from "./cell-kind";
import { readTextRows, type TextRow } from "./read-lines";
import type { Dialect, Separator } from "./recipe";

/** In order of preference where two explain the file equally well. */
const SEPARATORS: readonly Separator[] = [",", ";", "\t", "|", " "];
const HEAD_ROWS = 400;
/** A row of readings may hold a status text or two, not more. */
const MIN_VALUE_SHARE = 0.6;

export interface KindRow extends TextRow {
  readonly kinds: readonly CellKind[];
  /** Whether the row looks like readings rather than like words. */
  readonly looksLikeData: boolean;
}

export interface DialectFinding {
  readonly separator: Separator;
  readonly quote: Dialect["quote"];
  readonly rows: readonly KindRow[];
  /** The number of cells most data rows have. */
  readonly columnCount: number;
}

/**
 * Finds separator and quotes from the head of a file in UTF-8: the pair under which the most cells
 * of the most rows read as dates, numbers or known tokens. Null if under none of them two columns appear.
 * @param given the separator where somebody has said it
 */
export function findDialect(
  bytes: Uint8Array,
  isWholeFile: boolean,
  given?: Separator,
): DialectFinding | null {
  const quotes = quotesIn(bytes);
  let best: DialectFinding | null = null;
  let bestScore = 0;
  let bestStamps = 0;
  for (const separator of given === undefined ? SEPARATORS : [given]) {
    for (const quote of quotes) {
      const rows = readTextRows(bytes, { separator, quote }, isWholeFile, HEAD_ROWS).map(withKinds);
      const score = rows.reduce((sum, row) => sum + scoreOf(row), 0);
      const stamps = rows.filter(
        ({ kinds }) => kinds.length > 1 && kinds.includes("dateTime"),
      ).length;
      // Spaces also stand inside timestamps and thousands: they separate only if no other sign leaves
      // the timestamps whole.
      const beats = separator === " " ? score > bestScore && bestStamps === 0 : score > bestScore;
      if (beats) {
        bestScore = score;
        bestStamps = stamps;
        best = { separator, quote, rows, columnCount: usualCount(rows) };
      }
    }
  }
  return best;
}

/** Double quotes win where both could be; single quotes may also be Swiss thousands. */
function quotesIn(bytes: Uint8Array): readonly Dialect["quote"][] {
  if (bytes.includes(0x22)) return ['"'];
  return bytes.includes(0x27) ? [null, "'"] : [null];
}

function withKinds(row: TextRow): KindRow {
  const kinds = row.cells.map(cellKind);
  const values = kinds.filter((kind) => kind !== "text").length;
  const hasContent = kinds.some((kind) => isDateLike(kind) || kind === "number");
  const looksLikeData =
    kinds.length >= 2 &&
    hasContent &&
    (kinds.some(isDateLike) || values >= kinds.length * MIN_VALUE_SHARE);
  return { ...row, kinds, looksLikeData };
}

function scoreOf(row: KindRow): number {
  if (!row.looksLikeData) return 0;
  let score = 0;
  for (const kind of row.kinds) {
    if (kind === "text") score -= 0.5;
    // Empty cells fit any separator that happens to be doubled: they say nothing.
    else if (kind !== "empty") score += 1;
  }
  return Math.max(0, score);
}

function usualCount(rows: readonly KindRow[]): number {
  const counts = new Map<number, number>();
  for (const row of rows) {
    if (row.looksLikeData) counts.set(row.cellCount, (counts.get(row.cellCount) ?? 0) + 1);
  }
  let usual = 0;
  let most = 0;
  for (const [count, times] of counts) {
    if (times > most || (times === most && count > usual)) {
      usual = count;
      most = times;
    }
  }
  return usual;
}
