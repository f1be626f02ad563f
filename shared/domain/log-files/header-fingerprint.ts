import type { ColumnRecipe, Dialect } from "./recipe";

/** Serial numbers stand in the headers of some loggers: another logger of the kind is no other header. */
const LONG_NUMBER = /\d{5,}/g;

/** A header cell for comparing: case, spacing, quotes and serial numbers do not count. */
export function normalHeader(header: string): string {
  return header
    .normalize("NFKC")
    .toLowerCase()
    .replace(/["'`]/g, "")
    .replace(LONG_NUMBER, "#")
    .replace(/\s+/g, " ")
    .trim();
}

/**
 * What makes the header of a file, as one text: the count of columns, their names and the units row,
 * whatever separator or preamble stands around them. Files of one logger and setting have the same;
 * whoever stores it keeps its hash.
 *
 * @param firstLines lines of the file as written, the first being line 1
 * @returns null without any named column: then nothing tells one kind of file from another
 *
 * Example: columns `Time`, `Flow [L/s]` give `2|time|flow [l/s]|`.
 */
export function headerFingerprint(
  columns: readonly Pick<ColumnRecipe, "index" | "header">[],
  columnCount: number,
  dialect: Pick<Dialect, "unitsLine">,
  firstLines: readonly string[],
): string | null {
  const names = Array.from({ length: columnCount }, (_, index) =>
    normalHeader(columns.find((column) => column.index === index)?.header ?? ""),
  );
  if (names.every((name) => name === "")) return null;
  const { unitsLine } = dialect;
  const unitsRow = unitsLine === null ? "" : (firstLines[unitsLine - 1] ?? "");
  const units = normalHeader(unitsRow.replace(/[,;|\t]/g, " "));
  return [columnCount, ...names, units].join("|");
}
