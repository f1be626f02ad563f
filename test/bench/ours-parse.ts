import { createReadStream } from "node:fs";
import { createLogReader } from "@shared/domain/log-files/log-reader";
import { HEAD_BYTES, isUnreadable, recogniseHead } from "@shared/domain/log-files/recognise-head";
import { createFileScan } from "@shared/domain/log-files/file-scan";
import { finishRecognition } from "@shared/domain/log-files/finish-recognition";
import type { FileRecipe } from "@shared/domain/log-files/recipe";

function read(path: string, take: (bytes: Buffer) => void, end?: number): Promise<void> {
  return new Promise((resolve, reject) => {
    createReadStream(path, { highWaterMark: 1 << 20, ...(end === undefined ? {} : { end }) })
      .on("data", (chunk) => take(chunk as Buffer))
      .on("error", reject)
      .on("end", resolve);
  });
}

/** Recognises the bench's own file; its logger is set to UTC. */
export async function recipeOf(path: string): Promise<FileRecipe> {
  const parts: Buffer[] = [];
  await read(path, (bytes) => parts.push(bytes), HEAD_BYTES - 1);
  const head = recogniseHead(Buffer.concat(parts), false);
  if (isUnreadable(head)) throw new Error(`the bench's file is unreadable: ${head.code}`);
  const scan = createFileScan(head);
  await read(path, (bytes) => scan.push(bytes));
  const found = finishRecognition(head, scan.end());
  if (isUnreadable(found)) throw new Error(`the bench's file is unreadable: ${found.code}`);
  return { ...found.recipe, time: { ...found.recipe.time, clock: { kind: "utc" } } };
}

/** Bytes to columns of numbers and instants, as the import reads them. Answers the rows. */
export async function parseAlone(path: string, recipe: FileRecipe): Promise<number> {
  const reader = createLogReader(recipe);
  await read(path, (bytes) => reader.push(bytes));
  return reader.end().rowCount;
}
