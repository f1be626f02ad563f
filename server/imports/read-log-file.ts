import { closeSync, openSync, readSync } from "node:fs";
import { createLogReader } from "@shared/domain/log-files/log-reader";
import type { RawRows } from "@shared/domain/log-files/raw-rows";
import type { JobContext } from "@server/jobs/job-context";
import type { LogFile } from "@server/models/log-file";

const chunkBytes = 1 << 20;

/**
 * Hands the bytes of a stored file to `take`, a megabyte at a time in one buffer: whoever keeps
 * bytes copies them. Synchronous, because a worker has nothing else to do meanwhile.
 */
export function readChunks(path: string, take: (bytes: Uint8Array) => void): void {
  // Not a Buffer: its slice() would be a view of bytes that the next chunk overwrites.
  const buffer = new Uint8Array(chunkBytes);
  const file = openSync(path, "r");
  try {
    for (;;) {
      const length = readSync(file, buffer, 0, buffer.length, null);
      if (length === 0) return;
      take(buffer.subarray(0, length));
    }
  } finally {
    closeSync(file);
  }
}

/** Rows of earlier files count on, so that progress runs once from start to end of an import. */
export interface RowsSoFar {
  read: number;
  readonly total: number;
}

/** All rows of a file by its recipe, nothing repaired yet. */
export async function readLogFile(
  context: JobContext,
  file: LogFile,
  rows: RowsSoFar,
): Promise<RawRows> {
  const { recipe } = file;
  if (recipe === null) throw new Error(`log file ${file.id} has no recipe to be read by`);
  const reader = createLogReader(recipe, {
    expectedRows: file.recognition?.dataRowCount ?? undefined,
  });
  const before = rows.read;
  readChunks(await context.files.localPath(file.sha256), (bytes) => {
    context.checkpoint();
    reader.push(bytes);
    rows.read = before + reader.rowsRead;
    context.report({ stage: "reading", rowsRead: rows.read, rowsTotal: rows.total });
  });
  return reader.end();
}
