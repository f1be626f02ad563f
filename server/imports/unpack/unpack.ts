import { createReadStream } from "node:fs";
import { open } from "node:fs/promises";
import { Readable } from "node:stream";
import { createGunzip } from "node:zlib";
import {
  baseName,
  containerOf,
  gunzippedName,
  isArchive,
  isOldOffice,
  isSystemClutter,
  mayHoldLog,
  nameMisleads,
  UNPACK_LIMITS,
  type ContainerKind,
  type LeftOut,
  type UnpackNotes,
} from "@shared/domain/log-files/containers";
import { HEAD_BYTES, isUnreadable, recogniseHead } from "@shared/domain/log-files/recognise-head";
import type { StagedFile } from "@server/files/file-store";
import { isOtherSpreadsheet, isWorkbook, readWorkbook } from "./read-workbook";
import { openZip, type ZipArchive } from "./read-zip";
import { SheetText } from "./sheet-text";
import { UnpackBudget } from "./unpack-budget";
import { errorCode, UnpackRefused } from "./unpack-refused";

/** One text that came out of an upload, measured and waiting to be kept. */
export interface Member {
  /** What people see it called. */
  readonly name: string;
  /** The sheet, or the path in the archive. */
  readonly member: string;
  readonly staged: StagedFile;
}

export interface Unpacked {
  readonly kind: ContainerKind;
  readonly members: readonly Member[];
  readonly notes: UnpackNotes;
}

export interface Unpacking {
  stage(content: Readable): Promise<StagedFile>;
  checkpoint(): void;
  onMember(): void;
}

interface Upload {
  readonly path: string;
  readonly name: string;
  readonly byteLength: number;
}

/** A text with what its first bytes say about it. */
interface Candidate extends Member {
  readonly trouble: "noLog" | "notText" | null;
}

/**
 * Takes the texts out of an upload. What holds no log is left out and named, unless nothing else is
 * there: then its own trouble is what a person has to read.
 * @throws UnpackRefused with what is wrong; nothing is staged then.
 */
export async function unpack(upload: Upload, unpacking: Unpacking): Promise<Unpacked> {
  const candidates: Candidate[] = [];
  const leftOut: LeftOut[] = [];
  const budget = new UnpackBudget(() => unpacking.checkpoint());
  const take = async (name: string, member: string, content: AsyncIterable<Buffer>) => {
    unpacking.onMember();
    candidates.push(await stageText(name, member, content, unpacking));
  };
  try {
    const found = await readContainer(upload, budget, take, leftOut);
    const { kept, dropped } = withoutOthers(candidates);
    for (const { name, staged, trouble } of dropped) {
      await staged.discard();
      leftOut.push({ name, because: trouble ?? "noLog" });
    }
    if (kept.length === 0)
      throw new UnpackRefused(found.kind === "xlsx" ? "workbookEmpty" : "archiveEmpty", null);
    return {
      kind: found.kind,
      members: kept.map(({ name, member, staged }) => ({ name, member, staged })),
      notes: {
        leftOut,
        formulasWithoutValue: found.formulasWithoutValue,
        nameMisleads: nameMisleads(upload.name, found.kind),
        countsFrom1904: found.countsFrom1904,
      },
    };
  } catch (error) {
    for (const { staged } of candidates) await staged.discard();
    throw error;
  }
}

interface Found {
  readonly kind: ContainerKind;
  readonly formulasWithoutValue: number;
  readonly countsFrom1904: boolean;
}

type Take = (name: string, member: string, content: AsyncIterable<Buffer>) => Promise<void>;

async function readContainer(
  upload: Upload,
  budget: UnpackBudget,
  take: Take,
  leftOut: LeftOut[],
): Promise<Found> {
  const plain = { formulasWithoutValue: 0, countsFrom1904: false };
  if (containerOf(await headOf(upload.path)) === "gzip") {
    const name = gunzippedName(upload.name);
    await take(name, name, gunzip(upload, budget));
    return { kind: "gzip", ...plain };
  }
  const archive = await openZip(upload.path, budget);
  try {
    if (isOtherSpreadsheet(archive)) throw new UnpackRefused("otherSpreadsheet", upload.name);
    if (isWorkbook(archive)) return await readSheets(upload, archive, budget, take, leftOut);
    if (archive.entries.length > UNPACK_LIMITS.archiveEntries)
      throw new UnpackRefused("archiveTooManyEntries", String(archive.entries.length));
    const names = archive.entries.map(({ fileName }) => baseName(fileName));
    for (const entry of archive.entries) {
      const { fileName } = entry;
      if (isSystemClutter(fileName)) continue;
      const name = baseName(fileName);
      // Loggers call every file the same and tell them apart by folders.
      const isAlone = names.filter((other) => other === name).length === 1;
      if (mayHoldLog(fileName))
        await take(isAlone ? name : fileName, fileName, archive.read(entry));
      else leftOut.push({ name: fileName, because: "notText" });
    }
    return { kind: "zip", ...plain };
  } finally {
    archive.close();
  }
}

async function readSheets(
  upload: Upload,
  archive: ZipArchive,
  budget: UnpackBudget,
  take: Take,
  leftOut: LeftOut[],
): Promise<Found> {
  const workbook = await readWorkbook(archive);
  const shown = workbook.sheets.filter(({ isHidden }) => !isHidden);
  for (const { name } of workbook.sheets.filter(({ isHidden }) => isHidden))
    leftOut.push({ name: `${upload.name} – ${name}`, because: "hiddenSheet" });
  if (shown.length > UNPACK_LIMITS.archiveEntries)
    throw new UnpackRefused("archiveTooManyEntries", String(shown.length));
  let formulasWithoutValue = 0;
  for (const { name, entry } of shown) {
    const sheet = new SheetText(name, workbook, budget.textBounds(name));
    // With the sheet, so that a problem names the file, the sheet and the row.
    await take(`${upload.name} – ${name}`, name, sheet.read(archive.read(entry)));
    formulasWithoutValue += sheet.formulasWithoutValue;
  }
  return { kind: "xlsx", formulasWithoutValue, countsFrom1904: workbook.system === 1904 };
}

async function* gunzip(upload: Upload, budget: UnpackBudget): AsyncGenerator<Buffer> {
  const packed = createReadStream(upload.path);
  const text = createGunzip();
  packed.once("error", (error) => text.destroy(error));
  try {
    yield* budget.bounded(packed.pipe(text), upload.name, () => text.bytesWritten);
  } catch (error) {
    // Cut short, or with bytes that are no deflate: zlib names every such error by a Z_ code.
    throw errorCode(error).startsWith("Z_")
      ? new UnpackRefused("archiveBroken", upload.name)
      : error;
  } finally {
    packed.destroy();
    text.destroy();
  }
}

async function stageText(
  name: string,
  member: string,
  content: AsyncIterable<Buffer>,
  { stage }: Unpacking,
): Promise<Candidate> {
  const head: Buffer[] = [];
  let bytes = 0;
  async function* watched(): AsyncGenerator<Buffer> {
    for await (const chunk of content) {
      if (bytes === 0 && isArchive(chunk)) throw new UnpackRefused("archiveNested", member);
      if (bytes === 0 && isOldOffice(chunk)) throw new UnpackRefused("oldSpreadsheet", member);
      if (bytes < HEAD_BYTES) head.push(Buffer.from(chunk.subarray(0, HEAD_BYTES - bytes)));
      bytes += chunk.length;
      yield chunk;
    }
  }
  const staged = await stage(Readable.from(watched(), { objectMode: false }));
  const found = recogniseHead(new Uint8Array(Buffer.concat(head)), bytes <= HEAD_BYTES);
  const trouble = !isUnreadable(found) ? null : found.code === "notText" ? "notText" : "noLog";
  return { name, member, staged, trouble };
}

/** Texts without times are left out where others have some; where none has, all stay to say why. */
function withoutOthers(candidates: readonly Candidate[]) {
  const filled = candidates.filter(({ staged }) => staged.byteLength > 0);
  const logs = filled.filter(({ trouble }) => trouble === null);
  const kept = logs.length > 0 ? logs : filled;
  return { kept, dropped: candidates.filter((candidate) => !kept.includes(candidate)) };
}

async function headOf(path: string): Promise<Uint8Array> {
  const file = await open(path, "r");
  try {
    const { buffer, bytesRead } = await file.read(new Uint8Array(16), 0, 16, 0);
    return buffer.subarray(0, bytesRead);
  } finally {
    await file.close();
  }
}
