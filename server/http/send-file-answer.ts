import { once } from "node:events";
import { pipeline } from "node:stream/promises";
import type { Response } from "express";
import type { FileAnswer } from "./file-answer";

/** Sends a file for saving; a stream that breaks cuts the answer, never shortens it in silence. */
export async function sendFileAnswer(response: Response, { file }: FileAnswer): Promise<void> {
  response.attachment(file.name).set("Content-Type", file.contentType);
  if (file.byteLength !== undefined) response.set("Content-Length", String(file.byteLength));
  if (typeof file.body === "string" || Buffer.isBuffer(file.body)) {
    response.end(file.body);
    if (!response.writableFinished) await once(response, "close");
    return;
  }
  await pipeline(file.body, response);
}
