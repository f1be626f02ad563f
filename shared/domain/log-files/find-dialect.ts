import { cellKind, isDateLike, type CellKind } from "./cell-kind";
import { findFixedWidth } from "./find-fixed-width";
import { createFixedWidthStream, FIXED_WIDTH_SEPARATOR } from "./fixed-width-stream";
import { readTextRows, type TextRow } from "./read-lines";
import type { Dialect, Separator } from "./recipe";
import { concatBytes, createUtf8Stream } from "./text-encoding";

/** In order of preference where two explain the file equally well. */
const SEPARATORS: readonly Separator[] = [",", ";", "\t", "|", " "];
const HEAD_ROWS = 400;
/** A row of readings may hold a status text or two, not more. */
const MIN_VALUE_SHARE = 0.6;
/** Less than half a cell for all rows of the head together. */
const EVENNESS = 0.4 / HEAD_ROWS;
const NOTHING = new Uint8Array(0);

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
  /** Where columns begin whose width is fixed; null where a separator parts them. */
  readonly columnStarts: readonly number[] | null;
}

/** How somebody said that columns are parted. */
export interface GivenColumns {
  readonly separator?: Separator;
  /** Empty: of fixed width, the places to be found. */
  readonly columnStarts?: readonly number[];
}

/**
 * Finds separator and quotes from the head of a file in UTF-8: the pair under which the most cells
 * of the most rows read as dates, numbers or known tokens. Columns of fixed width are found where no
 * sign parts them and runs of spaces would put cells into the wrong column. Null if two columns appear
 * under none of these.
 * @param given what somebody has said
 */
export function findDialect(
  bytes: Uint8Array,
  isWholeFile: boolean,
  given: GivenColumns = {},
): DialectFinding | null {
  if (given.columnStarts !== undefined)
    return fixedWidthDialect(bytes, isWholeFile, given.columnStarts);
  const best = separatedDialect(bytes, isWholeFile, given.separator);
  if (given.separator !== undefined || (best !== null && best.separator !== " ")) return best;
  const fixed = fixedWidthDialect(bytes, isWholeFile, []);
  return fixed !== null && isBetterFixed(fixed, best) ? fixed : best;
}

function separatedDialect(
  bytes: Uint8Array,
  isWholeFile: boolean,
  given: Separator | undefined,
): DialectFinding | null {
  const quotes = quotesIn(bytes);
  let best: DialectFinding | null = null;
  let bestScore = 0;
  let bestStamps = 0;
  for (const separator of given === undefined ? SEPARATORS : [given]) {
    for (const quote of quotes) {
      const rows = readTextRows(bytes, { separator, quote }, isWholeFile, HEAD_ROWS).map(withKinds);
      const columnCount = usualCount(rows);
      // Where two separators do as well, the one that also parts the header has it.
      const even = rows.filter(({ cellCount }) => cellCount === columnCount).length;
      const score = scoreOfRows(rows) + even * EVENNESS;
      const stamps = rows.filter(
        ({ kinds }) => kinds.length > 1 && kinds.includes("dateTime"),
      ).length;
      // Spaces also stand inside timestamps and thousands: they separate only if no other sign leaves
      // the timestamps whole.
      const beats = separator === " " ? score > bestScore && bestStamps === 0 : score > bestScore;
      if (beats) {
        bestScore = score;
        bestStamps = stamps;
        best = { separator, quote, rows, columnCount, columnStarts: null };
      }
    }
  }
  return best;
}

/** @param given where columns begin; empty: to be found */
function fixedWidthDialect(
  bytes: Uint8Array,
  isWholeFile: boolean,
  given: readonly number[],
): DialectFinding | null {
  const text = new TextDecoder("utf-8").decode(bytes);
  // The head of a longer file ends in the middle of a line.
  const lines = isWholeFile ? text : text.slice(0, text.lastIndexOf("\n") + 1);
  const found = findFixedWidth(lines);
  const columnStarts = given.length > 0 ? given : found?.columnStarts;
  if (columnStarts === undefined) return null;
  const stream = createFixedWidthStream(
    createUtf8Stream("utf-8"),
    columnStarts,
    found?.firstBodyLine ?? 1,
  );
  const converted = concatBytes(
    new Uint8Array(stream.convert(bytes)),
    isWholeFile ? stream.finish() : NOTHING,
  );
  const dialect = { separator: FIXED_WIDTH_SEPARATOR, quote: null } as const;
  const rows = readTextRows(converted, dialect, isWholeFile, HEAD_ROWS).map(withKinds);
  if (scoreOfRows(rows) === 0) return null;
  return { ...dialect, rows, columnCount: columnStarts.length, columnStarts };
}

/** Runs of spaces do as well while every row has the same number of cells; a blank cell shifts a row. */
function isBetterFixed(fixed: DialectFinding, spaced: DialectFinding | null): boolean {
  if (spaced === null) return true;
  const data = spaced.rows.filter(({ looksLikeData }) => looksLikeData);
  const uneven = data.some(({ cellCount }) => cellCount !== spaced.columnCount);
  return uneven && scoreOfRows(fixed.rows) >= scoreOfRows(spaced.rows) * 0.9;
}

function scoreOfRows(rows: readonly KindRow[]): number {
  return rows.reduce((sum, row) => sum + scoreOf(row), 0);
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
