import { createHash, randomUUID } from "node:crypto";
import { createReadStream, createWriteStream } from "node:fs";
import { access, mkdir, open, readdir, rename, rm, stat } from "node:fs/promises";
import path from "node:path";
import { Readable, Transform } from "node:stream";
import { pipeline } from "node:stream/promises";
import { FileMissing, type FileStore, type StagedFile, type StoredFile } from "./file-store";

const hash = /^[0-9a-f]{64}$/;
const abandonedAfterMs = 24 * 3_600_000;

/**
 * Files in a folder of this machine: `files/ab/ab12…`, named by hash; what is still arriving stands
 * in `files/incoming` and is renamed when its last byte is on the disk.
 */
export class FolderFileStore implements FileStore {
  private readonly home: string;
  private readonly incoming: string;

  constructor(dataDir: string) {
    this.home = path.join(path.resolve(dataDir), "files");
    this.incoming = path.join(this.home, "incoming");
  }

  async put(content: Readable): Promise<StoredFile> {
    const { sha256, byteLength, keep, discard } = await this.stage(content);
    try {
      await keep();
    } catch (error) {
      await discard();
      throw error;
    }
    return { sha256, byteLength };
  }

  async stage(content: Readable): Promise<StagedFile> {
    await mkdir(this.incoming, { recursive: true, mode: 0o700 });
    const arriving = path.join(this.incoming, randomUUID());
    const digest = createHash("sha256");
    let byteLength = 0;
    const measure = new Transform({
      transform(chunk: Buffer, _encoding, done) {
        digest.update(chunk);
        byteLength += chunk.length;
        done(null, chunk);
      },
    });
    try {
      await pipeline(content, measure, createWriteStream(arriving, { mode: 0o600, flush: true }));
    } catch (error) {
      await rm(arriving, { force: true });
      throw error;
    }
    const sha256 = digest.digest("hex");
    return {
      sha256,
      byteLength,
      keep: () => this.moveIntoPlace(arriving, sha256, byteLength),
      discard: () => rm(arriving, { force: true }),
    };
  }

  read(sha256: string, options: { start?: number } = {}): Readable {
    const source = createReadStream(this.placeOf(sha256), { start: options.start ?? 0 });
    return source.on("error", (error: NodeJS.ErrnoException) => {
      if (error.code === "ENOENT") error.message = new FileMissing(sha256).message;
    });
  }

  async has(sha256: string): Promise<boolean> {
    try {
      await access(this.placeOf(sha256));
      return true;
    } catch {
      return false;
    }
  }

  async localPath(sha256: string): Promise<string> {
    if (!(await this.has(sha256))) throw new FileMissing(sha256);
    return this.placeOf(sha256);
  }

  async removeAbandoned(nowMs: number): Promise<void> {
    const names = await readdir(this.incoming).catch((error: NodeJS.ErrnoException) => {
      if (error.code === "ENOENT") return [];
      throw error;
    });
    for (const name of names) {
      const file = path.join(this.incoming, name);
      const { mtimeMs } = await stat(file);
      if (nowMs - mtimeMs > abandonedAfterMs) await rm(file, { force: true });
    }
  }

  private placeOf(sha256: string): string {
    // The address becomes a path, so nothing but a hash may ever reach it.
    if (!hash.test(sha256)) throw new RangeError("not a SHA-256 in lower-case hexadecimal");
    return path.join(this.home, sha256.slice(0, 2), sha256);
  }

  private async moveIntoPlace(arriving: string, sha256: string, byteLength: number) {
    const place = this.placeOf(sha256);
    const folder = path.dirname(place);
    await mkdir(folder, { recursive: true, mode: 0o700 });
    const existing = await stat(place).catch(() => null);
    if (existing?.size === byteLength) {
      await rm(arriving);
      return;
    }
    await rename(arriving, place);
    // The rename itself lives in the folder, which has to reach the disk as well.
    const handle = await open(folder, "r");
    try {
      await handle.sync();
    } finally {
      await handle.close();
    }
  }
}
