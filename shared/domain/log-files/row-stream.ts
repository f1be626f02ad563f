import { createFixedWidthStream } from "./fixed-width-stream";
import type { Dialect } from "./recipe";
import { createUtf8Stream, type Utf8Stream } from "./text-encoding";

/**
 * Turns the bytes of a file into the UTF-8 that a tokeniser with the dialect's separator splits: decoded,
 * and with columns of fixed width set apart. Line numbers are those of the file.
 */
export function createRowStream(
  dialect: Pick<Dialect, "encoding" | "columnStarts" | "firstDataLine">,
): Utf8Stream {
  const utf8 = createUtf8Stream(dialect.encoding);
  const { columnStarts } = dialect;
  if (columnStarts === undefined || columnStarts.length === 0) return utf8;
  return createFixedWidthStream(utf8, columnStarts, dialect.firstDataLine);
}
