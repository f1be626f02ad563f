import { isArchive, isOldOffice } from "./containers";
import { findDialect, type KindRow } from "./find-dialect";
import { findHeader, labelAndValue, type HeaderFinding } from "./find-header";
import { findTimeColumns, hasTime, wordlessColumns, type TimeColumns } from "./find-times";
import { firstLinesOf } from "./read-lines";
import type { Dialect } from "./recipe";
import type { Unreadable } from "./recognition";
import { MAX_CELLS } from "./row-tokeniser";
import {
  concatBytes,
  createUtf8Stream,
  detectEncoding,
  type EncodingFinding,
} from "./text-encoding";

/** Bytes of a file's start that are enough to recognise its shape. */
export const HEAD_BYTES = 256 * 1024;
const FIRST_LINES = 40;
/** Wider rows are no logger's; a recipe with more columns could not be checked by a person. */
export const MAX_COLUMNS = 200;

/** What the first bytes of a file say. The rest needs the whole file: see {@link createFileScan}. */
export interface HeadRecognition {
  readonly encoding: EncodingFinding;
  readonly dialect: Dialect;
  readonly columnCount: number;
  readonly header: HeaderFinding;
  readonly times: TimeColumns;
  readonly firstLines: readonly string[];
  /** The first line with a character that tells encodings apart, and the word it stands in. */
  readonly encodingProof: { readonly line: number; readonly cell: string } | null;
}

export function isUnreadable(value: HeadRecognition | Unreadable | object): value is Unreadable {
  return "code" in value;
}

/** What somebody has said about how a file is written; the rest is recognised. */
export type GivenDialect = Partial<
  Pick<Dialect, "encoding" | "separator" | "headerLine" | "columnStarts">
>;

/**
 * Recognises encoding, separator, quotes, header and the place of the times from the first bytes.
 * @param head the first bytes of the file, at best {@link HEAD_BYTES}
 * @param isWholeFile true if nothing follows
 */
export function recogniseHead(
  head: Uint8Array,
  isWholeFile: boolean,
  given: GivenDialect = {},
): HeadRecognition | Unreadable {
  if (head.length === 0) return unreadable("empty");
  if (isOldOffice(head)) return unreadable("oldSpreadsheet");
  if (isArchive(head) || isPdf(head)) return unreadable("notText");
  const encoding: EncodingFinding | null = given.encoding
    ? { encoding: given.encoding, markBytes: 0, certainty: "proved" }
    : detectEncoding(head);
  if (encoding === null) return unreadable("notText");
  const stream = createUtf8Stream(encoding.encoding);
  const bytes = isWholeFile
    ? concatBytes(stream.convert(head), stream.finish())
    : stream.convert(head);
  if (bytes.every((byte) => byte <= 32)) return unreadable("empty");

  const firstLines = firstLinesOf(bytes, FIRST_LINES);
  const found = findDialect(bytes, isWholeFile, given);
  if (found === null)
    return unreadable(looksLikeWords(firstLines) ? "noTimes" : "noRows", 1, firstLines[0]);
  if (found.columnCount > Math.min(MAX_COLUMNS, MAX_CELLS))
    return unreadable("tooManyColumns", found.rows[0]?.line, null);

  const isBelowHeader = ({ line }: { readonly line: number }) => line > (given.headerLine ?? 0);
  const data = found.rows.filter(
    (row) => row.looksLikeData && row.cellCount === found.columnCount && isBelowHeader(row),
  );
  const roughHeaders = findHeader(
    rowsBefore(found.rows, data[0]),
    found.columnCount,
    given.headerLine,
  ).headers;
  const times = findTimeColumns(data, found.columnCount, roughHeaders);
  if (times === null) return unreadable("noTimes", data[0]?.line, data[0]?.cells[0]);
  const wordless = wordlessColumns(data, found.columnCount);
  const firstRow = found.rows.find(
    (row) =>
      row.cellCount === found.columnCount && isBelowHeader(row) && hasTime(row, times, wordless),
  );
  if (firstRow === undefined) return unreadable("noRows");

  const header = findHeader(rowsBefore(found.rows, firstRow), found.columnCount, given.headerLine);
  // Fewer names than cells in a comma file: decimal commas have cut the numbers in two.
  if (
    found.separator === "," &&
    header.headerLine !== null &&
    header.headerCellCount < filledColumns(data)
  ) {
    return unreadable("columnsDoNotMatchHeader", firstRow.line, firstRow.cells.join(","));
  }
  return {
    encoding,
    dialect: {
      encoding: encoding.encoding,
      separator: found.separator,
      quote: found.quote,
      headerLine: header.headerLine,
      unitsLine: header.unitsLine,
      firstDataLine: firstRow.line,
      ...(found.columnStarts && { columnStarts: found.columnStarts }),
    },
    columnCount: found.columnCount,
    header:
      found.columnStarts || found.separator === " " ? withWholeLines(header, firstLines) : header,
    times,
    firstLines,
    encodingProof: encodingProof(firstLines),
  };
}

function unreadable(code: Unreadable["code"], line?: number, cell?: string | null): Unreadable {
  return {
    code,
    line: line ?? null,
    cell: cell === undefined || cell === null ? null : cell.slice(0, 200),
  };
}

/** Lines above the header are sentences there, not cells: they are read from the line as written. */
function withWholeLines(header: HeaderFinding, lines: readonly string[]): HeaderFinding {
  const preamble = header.preamble.flatMap((entry) => {
    const text = lines[entry.line - 1];
    if (text === undefined) return [entry];
    const cells = text.trim().split(/\s{2,}/);
    return labelAndValue({ line: entry.line, cells });
  });
  return { ...header, preamble };
}

function encodingProof(lines: readonly string[]): HeadRecognition["encodingProof"] {
  for (const [index, line] of lines.entries()) {
    const word = /[^\s;,|]*[^\u0000-\u007f][^\s;,|]*/.exec(line)?.[0];
    if (word !== undefined) return { line: index + 1, cell: word.slice(0, 60) };
  }
  return null;
}

function rowsBefore(rows: readonly KindRow[], first: KindRow | undefined): readonly KindRow[] {
  return first === undefined ? [] : rows.filter((row) => row.line < first.line);
}

/** Columns up to the last one that most rows fill. */
function filledColumns(rows: readonly KindRow[]): number {
  let last = 0;
  for (let i = 0; i < (rows[0]?.cells.length ?? 0); i++) {
    if (rows.filter((row) => (row.cells[i] ?? "") !== "").length > rows.length * 0.5) last = i + 1;
  }
  return last;
}

const PDF = [0x25, 0x50, 0x44, 0x46];

function isPdf(head: Uint8Array): boolean {
  return PDF.every((byte, i) => head[i] === byte);
}

/** More than one line of something: then times are what is missing, else rows are. */
function looksLikeWords(lines: readonly string[]): boolean {
  return lines.filter((line) => line.trim() !== "").length > 2;
}
