import { Transform, type TransformCallback } from "node:stream";
import multer, { MulterError, type StorageEngine } from "multer";
import { MAX_FILE_BYTES } from "@shared/contracts/imports";
import { containerOf, endingOf, UPLOAD_ENDINGS } from "@shared/domain/log-files/containers";
import type { FileStore, StoredFile } from "@server/files/file-store";
import type { Context } from "@server/http/context";
import { HttpProblem, Invalid, TooLarge } from "@server/http/errors";

export interface ReceivedFile extends StoredFile {
  readonly name: string;
  /** What has to be unpacked before there is text; told by the bytes, whatever the name says. */
  readonly container: "zip" | "gzip" | null;
}

const HEAD_BYTES = 16;

/** The same of a file that came in before. */
export async function containerOfStored(
  files: FileStore,
  sha256: string,
): Promise<ReceivedFile["container"]> {
  const stream = files.read(sha256);
  for await (const chunk of stream) return containerOf(chunk as Buffer);
  return null;
}

const mebibyte = 1024 * 1024;

/**
 * Headers of a multipart part reach us as Latin-1, whatever the browser wrote; browsers write
 * UTF-8. A name that is no UTF-8 was Latin-1 indeed. Folders before the name are cut off.
 */
export function fileNameOf(header: string): string {
  const utf8 = Buffer.from(header, "latin1").toString("utf8");
  const name = utf8.includes("\uFFFD") ? header : utf8;
  const last = name.split(/[\\/]/).pop() ?? "";
  return last
    .replace(/\p{Cc}/gu, "")
    .trim()
    .slice(0, 255);
}

/** Passes bytes on and keeps the first few. */
class HeadKeeper extends Transform {
  head = Buffer.alloc(0);

  override _transform(chunk: Buffer, _encoding: BufferEncoding, done: TransformCallback): void {
    if (this.head.length < HEAD_BYTES)
      this.head = Buffer.concat([this.head, chunk.subarray(0, HEAD_BYTES - this.head.length)]);
    done(null, chunk);
  }
}

/** Streams the part into the file store; nothing of it passes through memory as a whole. */
function storageIn(files: FileStore, take: (file: ReceivedFile) => void): StorageEngine {
  return {
    _handleFile(_request, file, done) {
      // Cut short at the limit it must not be stored as if it were whole.
      file.stream.once("limit", () => file.stream.destroy(new Error("over the size limit")));
      const keeper = new HeadKeeper();
      file.stream.once("error", (error) => keeper.destroy(error));
      files
        .put(file.stream.pipe(keeper))
        .then((stored) => {
          const name = fileNameOf(file.originalname);
          take({ ...stored, name, container: containerOf(keeper.head) });
          done(null, { size: stored.byteLength });
        })
        .catch((error: unknown) => done(error));
    },
    // A file is kept under its hash and may be another import's as well: nothing to remove.
    _removeFile(_request, _file, done) {
      done(null);
    },
  };
}

/**
 * Takes the file of a multipart request in: one part named `file`, at most 200 MB, by its ending a
 * text file or something that holds one.
 * @throws Invalid, TooLarge or a 507 problem, each with what to do.
 */
export async function receiveLogFile(context: Context): Promise<ReceivedFile> {
  const { request, response, services } = context;
  let received: ReceivedFile | undefined;
  const receive = multer({
    storage: storageIn(services.files, (file) => (received = file)),
    limits: { fileSize: MAX_FILE_BYTES, files: 1, fields: 5, parts: 6, headerPairs: 50 },
    fileFilter(_request, file, accept) {
      const name = fileNameOf(file.originalname);
      if (UPLOAD_ENDINGS.includes(endingOf(name))) accept(null, true);
      else accept(notALog(name));
    },
  }).single("file");
  await new Promise<void>((resolve, reject) => {
    receive(request, response, (error: unknown) => (error ? reject(asProblem(error)) : resolve()));
  });
  if (received === undefined)
    throw Invalid.field("file", "missing", "Send one logger file in the field named file.");
  return received;
}

const spreadsheets = [".xls", ".xlsb", ".xlsm", ".ods", ".numbers"];
const archives = [".7z", ".rar", ".tar", ".tgz", ".bz2", ".xz", ".zst"];

function notALog(name: string): Invalid {
  const ending = endingOf(name);
  if (spreadsheets.includes(ending))
    return Invalid.field(
      "file",
      "other-spreadsheet",
      `${name} is a spreadsheet of a kind that is not read here. Save it as .xlsx or as CSV and send that.`,
    );
  if (archives.includes(ending))
    return Invalid.field(
      "file",
      "other-archive",
      `${name} is an archive of a kind that is not opened here. Pack the logs as .zip, or send them one by one.`,
    );
  return Invalid.field(
    "file",
    "not-a-log",
    `${name || "This file"} is no log by its ending. Send text (.csv, .tsv, .txt and the like), .xlsx, .zip or .gz.`,
  );
}

function asProblem(error: unknown): unknown {
  if (error instanceof MulterError) {
    if (error.code === "LIMIT_FILE_SIZE")
      return new TooLarge(
        `A file may hold up to ${MAX_FILE_BYTES / mebibyte} MB.`,
        "Export a shorter period, or several files: one import takes twelve.",
      );
    return Invalid.field("file", "upload", "Send exactly one file, in the field named file.");
  }
  if (error instanceof Error && "code" in error && error.code === "ENOSPC")
    return new HttpProblem({
      status: 507,
      code: "storage-full",
      title: "Storage full",
      detail: "The server has no room left for this file.",
      remedy: "Tell whoever runs the server; nothing of the file was kept.",
    });
  return error;
}
