import { cellKind, isDateLike } from "./cell-kind";

/** Lines that must look like readings before their blanks prove anything. */
const MIN_LINES = 4;
const MAX_LINES = 400;
/** No printer and no terminal was ever wider; longer lines are something else. */
const MAX_LINE_CHARACTERS = 1000;
/** Lines in a hundred that may be damaged and have a character where all others have none. */
const DAMAGED_SHARE = 0.01;
/** Cells that begin, or end, at the same character make a column flush on that side. */
const FLUSH_SHARE = 0.9;

export interface FixedWidthFinding {
  /** 0-based characters (code points) at which columns begin; the first is 0. */
  readonly columnStarts: readonly number[];
  /** 1-based line of the first row of readings. */
  readonly firstBodyLine: number;
}

interface Field {
  readonly start: number;
  /** The character after its last. */
  readonly end: number;
}

/**
 * Finds columns by the characters that are blank in every line of readings. Null where a line holds a
 * tab, where too few lines look like readings, or where they have no two columns in common.
 * @param text the head of a file, whole lines only
 */
export function findFixedWidth(text: string): FixedWidthFinding | null {
  if (text.includes("\t")) return null;
  const lines = text
    .split(/\r\n|\n|\r/)
    .slice(0, MAX_LINES)
    .map((line) => [...line.trimEnd()]);
  const body = lines.flatMap((line, index) => (looksLikeReadings(line) ? [index] : []));
  const [first] = body;
  if (body.length < MIN_LINES || first === undefined) return null;
  const rows = body.map((index) => lines[index] as string[]);
  const above = lines.slice(Math.max(0, first - 2), first);
  const fields = joinWords(fieldsOf(rows), above, rows);
  if (fields.length < 2) return null;
  return {
    columnStarts: fields.map((field, i) =>
      i === 0 ? 0 : boundary(fields[i - 1] as Field, field, rows, above),
    ),
    firstBodyLine: first + 1,
  };
}

function looksLikeReadings(line: readonly string[]): boolean {
  if (line.length === 0 || line.length > MAX_LINE_CHARACTERS) return false;
  const words = line.join("").trim().split(/ +/);
  const kinds = words.map(cellKind);
  const values = kinds.filter((kind) => kind !== "text").length;
  return (
    words.length >= 2 &&
    (kinds.some(isDateLike) || kinds[0] === "number") &&
    values >= words.length * 0.4
  );
}

/** Stretches of characters that some line uses, parted by characters that none does. */
function fieldsOf(rows: readonly (readonly string[])[]): Field[] {
  const width = rows.reduce((most, row) => Math.max(most, row.length), 0);
  const used = new Int32Array(width + 1);
  for (const row of rows)
    for (let i = 0; i < row.length; i++) if (row[i] !== " ") used[i] = (used[i] as number) + 1;
  const allowed = Math.floor(rows.length * DAMAGED_SHARE);
  const fields: Field[] = [];
  let start = -1;
  for (let i = 0; i <= width; i++) {
    const isUsed = (used[i] as number) > allowed;
    if (isUsed && start < 0) start = i;
    if (!isUsed && start >= 0) {
      fields.push({ start, end: i });
      start = -1;
    }
  }
  return fields;
}

/**
 * Words of one column may happen to have their one blank at the same place (`LOW SIGNAL`, `NO  FLOW`), and
 * so does the AM or PM of a time. Such a blank parts no columns, unless a header begins right after it.
 */
function joinWords(
  fields: readonly Field[],
  above: readonly (readonly string[])[],
  rows: readonly (readonly string[])[],
): Field[] {
  const joined: Field[] = [];
  for (const field of fields) {
    const before = joined[joined.length - 1];
    const isJoined =
      before !== undefined &&
      field.start - before.end === 1 &&
      (isHalfDay(field, rows) ||
        (areWords(before, rows) &&
          areWords(field, rows) &&
          !above.some((line) => beginsAt(line, field.start))));
    if (isJoined) joined[joined.length - 1] = { start: before.start, end: field.end };
    else joined.push(field);
  }
  return joined;
}

function isHalfDay(field: Field, rows: readonly (readonly string[])[]): boolean {
  const cells = cellsOf(field, rows);
  return cells.length > 0 && cells.every((cell) => /^[ap]\.?m\.?$/i.test(cell));
}

/** Words and tokens such as OK, and no number or time among them. */
function areWords(field: Field, rows: readonly (readonly string[])[]): boolean {
  const kinds = cellsOf(field, rows).map(cellKind);
  return kinds.includes("text") && kinds.every((kind) => kind === "text" || kind === "token");
}

function beginsAt(line: readonly string[], at: number): boolean {
  return (line[at] ?? " ") !== " " && (line[at - 1] ?? " ") === " ";
}

/** A single blank may stand within a header, such as `FLOW GPM`; two part it from the one before. */
function beginsApart(line: readonly string[], at: number): boolean {
  return beginsAt(line, at) && (line[at - 2] ?? " ") === " ";
}

function cellsOf({ start, end }: Field, rows: readonly (readonly string[])[]): string[] {
  return rows.map((row) => row.slice(start, end).join("").trim()).filter((cell) => cell !== "");
}

/**
 * Where the column on the right begins, in the gap between two: where a header begins there, for its
 * words say which column they head. Else a column flush right may grow to the left further down, one
 * flush left to the right, so the room goes to the side that needs it.
 */
function boundary(
  left: Field,
  right: Field,
  rows: readonly (readonly string[])[],
  above: readonly (readonly string[])[],
): number {
  const from = left.end + 1;
  const to = right.start;
  for (const line of above) for (let at = from; at < to; at++) if (beginsApart(line, at)) return at;
  const growsLeft = !isFlush(right, rows, "start");
  const growsRight = !isFlush(left, rows, "end");
  if (growsLeft && growsRight) return from + ((to - from) >> 1);
  return growsLeft ? from : to;
}

function isFlush(
  field: Field,
  rows: readonly (readonly string[])[],
  side: "start" | "end",
): boolean {
  const at = side === "start" ? field.start : field.end - 1;
  const filled = rows.filter((row) => row.slice(field.start, field.end).some((c) => c !== " "));
  const flush = filled.filter((row) => (row[at] ?? " ") !== " ").length;
  return flush >= filled.length * FLUSH_SHARE;
}
