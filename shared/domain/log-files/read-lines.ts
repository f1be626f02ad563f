import type { Dialect } from "./recipe";
import { MAX_CELLS, RowTokeniser } from "./row-tokeniser";

/** A row of the head as text. */
export interface TextRow {
  readonly line: number;
  readonly cells: readonly string[];
  /** Cells the row really had; more than `cells.length` only in absurdly wide rows. */
  readonly cellCount: number;
}

/** Splits bytes in UTF-8 into rows of text, at most `maxRows`. For heads of files, not for bodies. */
export function readTextRows(
  bytes: Uint8Array,
  dialect: Pick<Dialect, "separator" | "quote">,
  isWholeFile: boolean,
  maxRows: number,
): readonly TextRow[] {
  const rows: TextRow[] = [];
  const tokeniser = new RowTokeniser(dialect, (row) => {
    if (rows.length >= maxRows || row.oversize) return;
    const count = Math.min(row.cellCount, MAX_CELLS);
    const cells: string[] = [];
    for (let i = 0; i < count; i++) cells.push(row.cellText(i));
    rows.push({ line: row.line, cells, cellCount: row.cellCount });
  });
  tokeniser.push(bytes);
  // The head of a longer file ends in the middle of a row, which proves nothing.
  if (isWholeFile) tokeniser.end();
  return rows;
}

/** The first lines as written, without splitting: at most `maxLines` of at most 400 characters. */
export function firstLinesOf(bytes: Uint8Array, maxLines: number): readonly string[] {
  const text = new TextDecoder("utf-8").decode(bytes.subarray(0, maxLines * 2000));
  const lines: string[] = [];
  let from = 0;
  while (lines.length < maxLines && from < text.length) {
    let to = from;
    while (to < text.length && text[to] !== "\n" && text[to] !== "\r") to++;
    lines.push(text.slice(from, Math.min(to, from + 400)));
    from = text[to] === "\r" && text[to + 1] === "\n" ? to + 2 : to + 1;
  }
  return lines;
}
