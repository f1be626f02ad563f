import type { Readable } from "node:stream";

/** A file that was taken in: what its bytes are, not what it is called. */
export interface StoredFile {
  /** SHA-256 of the bytes in lower-case hexadecimal: also the file's address. */
  readonly sha256: string;
  readonly byteLength: number;
}

/** Bytes that have arrived whole and are measured, but are not among the files yet. */
export interface StagedFile extends StoredFile {
  /** Makes it one of the files. */
  keep(): Promise<void>;
  /** Leaves nothing behind. */
  discard(): Promise<void>;
}

/**
 * Keeps files byte for byte. A file's address is the hash of its bytes, so one that is stored
 * twice takes its space once, and a damaged one can be told.
 */
export interface FileStore {
  /**
   * Takes the whole stream in; the file is there only once this has resolved, and then survives a
   * loss of power. A stream that fails leaves nothing behind.
   */
  put(content: Readable): Promise<StoredFile>;
  /** The same, with the last step left to the caller, who may still find that it is not wanted. */
  stage(content: Readable): Promise<StagedFile>;
  /** The bytes from `start` on. Errors with {@link FileMissing} through the stream. */
  read(sha256: string, options?: { start?: number }): Readable;
  has(sha256: string): Promise<boolean>;
  /** A path on this machine for readers that seek, such as import workers. */
  localPath(sha256: string): Promise<string>;
  /** Removes what uploads that broke off a day ago or earlier left behind. */
  removeAbandoned(nowMs: number): Promise<void>;
}

/** The store has lost a file that a row still names: restore it from the backup of that day. */
export class FileMissing extends Error {
  constructor(readonly sha256: string) {
    super(`stored file ${sha256} is missing`);
    this.name = "FileMissing";
  }
}
