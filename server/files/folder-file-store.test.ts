import { mkdtemp, readdir, rm } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { Readable } from "node:stream";
import { buffer } from "node:stream/consumers";
import { FolderFileStore } from "./folder-file-store";

let folder: string;
let store: FolderFileStore;

beforeEach(async () => {
  folder = await mkdtemp(path.join(os.tmpdir(), "loopwright-files-"));
  store = new FolderFileStore(folder);
});
afterEach(() => rm(folder, { recursive: true, force: true }));

test("bytes come back unchanged under their SHA-256, stored twice or once", async () => {
  const bytes = Buffer.from([0xff, 0xfe, 0x00, 0x0d, 0x0a, 0x41]);
  const first = await store.put(Readable.from([bytes.subarray(0, 2), bytes.subarray(2)]));
  const again = await store.put(Readable.from([bytes]));
  expect(again).toEqual(first);
  expect(first.byteLength).toBe(6);
  expect(await buffer(store.read(first.sha256))).toEqual(bytes);
  expect(await buffer(store.read(first.sha256, { start: 4 }))).toEqual(bytes.subarray(4));
});

test("the address is the published SHA-256", async () => {
  // FIPS 180-2, appendix B.1: the message "abc".
  const { sha256 } = await store.put(Readable.from([Buffer.from("abc")]));
  expect(sha256).toBe("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
});

test("an upload that breaks off leaves nothing behind", async () => {
  async function* broken() {
    yield Buffer.from("half");
    throw new Error("connection lost");
  }
  await expect(store.put(Readable.from(broken()))).rejects.toThrow("connection lost");
  expect(await readdir(path.join(folder, "files", "incoming"))).toEqual([]);
});

test("only a hash is an address, so no name reaches outside the folder", () => {
  expect(() => store.read("../../etc/hostname")).toThrow(RangeError);
});
