import type { Readable } from "node:stream";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { MAX_CELLS, RowTokeniser } from "@shared/domain/log-files/row-tokeniser";
import { createRowStream } from "@shared/domain/log-files/row-stream";

/** Time a preview may hold the event loop at a stretch is that of one chunk: about a millisecond. */
export interface PreviewRow {
  readonly line: number;
  readonly cells: string[];
}

/** Up to `limit` rows from line `fromLine` on, cells as written. Reads no further than it must. */
export async function previewRows(
  content: Readable,
  dialect: FileRecipe["dialect"],
  fromLine: number,
  limit: number,
): Promise<PreviewRow[]> {
  const rows: PreviewRow[] = [];
  const stream = createRowStream(dialect);
  const tokeniser = new RowTokeniser(dialect, (row) => {
    if (row.line < fromLine || rows.length >= limit) return;
    const count = Math.min(row.cellCount, MAX_CELLS);
    rows.push({
      line: row.line,
      cells: Array.from({ length: count }, (_, index) => row.cellText(index)),
    });
  });
  for await (const chunk of content) {
    // A plain array's slice copies, a Buffer's does not, and the tokeniser keeps slices.
    const bytes = new Uint8Array(chunk as Buffer);
    tokeniser.push(stream.convert(bytes));
    if (rows.length >= limit) {
      content.destroy();
      return rows;
    }
  }
  tokeniser.push(stream.finish());
  tokeniser.end();
  return rows;
}
