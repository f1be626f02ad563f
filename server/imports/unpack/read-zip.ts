import type { Readable } from "node:stream";
import { crc32 } from "node:zlib";
import { open, type Entry, type ZipFile } from "yauzl";
import { UNPACK_LIMITS } from "@shared/domain/log-files/containers";
import type { UnpackBudget } from "./unpack-budget";
import { errorCode, UnpackRefused } from "./unpack-refused";

const SYMBOLIC_LINK = 0o120000;
const FILE_TYPE = 0o170000;

/** An archive with its directory read: nothing of it is unpacked yet. */
export interface ZipArchive {
  /** Files of the archive; folders are left out. */
  readonly entries: readonly Entry[];
  /** The bytes of an entry, bounded and held against its checksum. */
  read(entry: Entry): AsyncGenerator<Buffer>;
  close(): void;
}

/**
 * Opens an archive and reads its directory.
 * @throws UnpackRefused for one that is broken, locked, or names a place outside itself.
 */
export async function openZip(path: string, budget: UnpackBudget): Promise<ZipArchive> {
  const zip = await openFile(path);
  try {
    // Refused by what the end of the archive says, before ten thousand entries are listed.
    if (zip.entryCount > UNPACK_LIMITS.workbookEntries)
      throw new UnpackRefused("archiveTooManyEntries", String(zip.entryCount));
    const entries = await listEntries(zip);
    return {
      entries,
      read: (entry) =>
        budget.bounded(bytesOf(zip, entry), entry.fileName, () => entry.compressedSize),
      close: () => zip.close(),
    };
  } catch (error) {
    zip.close();
    throw error;
  }
}

function openFile(path: string): Promise<ZipFile> {
  return new Promise((resolve, reject) => {
    open(path, { lazyEntries: true, autoClose: false }, (error, zip) => {
      if (error) reject(refusalOf(error, null));
      else resolve(zip);
    });
  });
}

function listEntries(zip: ZipFile): Promise<Entry[]> {
  return new Promise((resolve, reject) => {
    const entries: Entry[] = [];
    zip.on("error", (error: Error) => reject(refusalOf(error, null)));
    zip.on("end", () => resolve(entries));
    zip.on("entry", (entry: Entry) => {
      const { fileName } = entry;
      if (((entry.externalFileAttributes >>> 16) & FILE_TYPE) === SYMBOLIC_LINK)
        return reject(new UnpackRefused("archiveUnsafeName", fileName));
      if (!fileName.endsWith("/")) {
        if (entry.isEncrypted()) return reject(new UnpackRefused("archiveEncrypted", fileName));
        if (!entry.canDecodeFileData()) return reject(new UnpackRefused("archiveMethod", fileName));
        entries.push(entry);
      }
      zip.readEntry();
    });
    zip.readEntry();
  });
}

async function* bytesOf(zip: ZipFile, entry: Entry): AsyncGenerator<Buffer> {
  let sum = 0;
  let stream: Readable | null = null;
  try {
    stream = await openEntry(zip, entry);
    for await (const chunk of stream) {
      sum = crc32(chunk as Buffer, sum);
      yield chunk as Buffer;
    }
  } catch (error) {
    throw error instanceof UnpackRefused ? error : refusalOf(error, entry.fileName);
  } finally {
    stream?.destroy();
  }
  if (sum !== entry.crc32) throw new UnpackRefused("archiveBroken", entry.fileName);
}

function openEntry(zip: ZipFile, entry: Entry): Promise<Readable> {
  return new Promise((resolve, reject) => {
    zip.openReadStream(entry, (error, stream) => {
      if (error) reject(error);
      else resolve(stream);
    });
  });
}

/** What the disk says stays what it is; what the package says of an archive is the archive's trouble. */
function refusalOf(error: unknown, member: string | null): unknown {
  const code = errorCode(error);
  if (code.startsWith("E") && !code.startsWith("ERR_")) return error;
  if (isOurs(error)) return error;
  const message =
    typeof error === "object" && error !== null && "message" in error ? String(error.message) : "";
  const outside = /^(absolute path|invalid relative path|invalid characters in fileName)/;
  if (outside.test(message))
    return new UnpackRefused("archiveUnsafeName", message.replace(/^[^:]*: ?/, ""));
  return new UnpackRefused("archiveBroken", member);
}

/** A bug of ours is no trouble of the archive. */
function isOurs(error: unknown): boolean {
  return error instanceof TypeError || error instanceof ReferenceError;
}
