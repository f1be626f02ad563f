/** What holds a log besides plain text. */
export type ContainerKind = "xlsx" | "zip" | "gzip";

/** Endings of files that are text themselves. */
export const TEXT_ENDINGS = [
  ".csv",
  ".tsv",
  ".tab",
  ".txt",
  ".dat",
  ".asc",
  ".prn",
  ".log",
] as const;
/** Endings of files that hold text tables and are unpacked. */
export const CONTAINER_ENDINGS = [".xlsx", ".zip", ".gz"] as const;
export const UPLOAD_ENDINGS: readonly string[] = [...TEXT_ENDINGS, ...CONTAINER_ENDINGS];

const mib = 1024 * 1024;

/**
 * What an archive may unpack to. A log of readings packs 5 to 40 times smaller; a member past the
 * ratio is built to fill a disk. Workbooks hold drawings and styles besides, so they have more parts.
 */
export const UNPACK_LIMITS = {
  memberBytes: 200 * mib,
  totalBytes: 400 * mib,
  archiveEntries: 100,
  workbookEntries: 2000,
  ratio: 200,
  /** Less than this is harmless however densely it was packed. */
  ratioCountsFromBytes: mib,
} as const;

/** Why an upload was not unpacked, or not all of it; each has its remedy on screen. */
export type UnpackCode =
  | "oldSpreadsheet"
  | "otherSpreadsheet"
  | "archiveBroken"
  | "archiveEncrypted"
  | "archiveNested"
  | "archiveTooLarge"
  | "archiveTooDense"
  | "archiveTooManyEntries"
  | "archiveTooManyFiles"
  | "archiveUnsafeName"
  | "archiveMethod"
  | "archiveEmpty"
  | "workbookEmpty"
  | "workbookUnsafe"
  | "alreadyThere";

/** A part of an upload that is no log: named, so that nothing disappears unseen. */
export interface LeftOut {
  readonly name: string;
  readonly because: "noLog" | "notText" | "hiddenSheet" | "sameFile" | "emptySheet";
}

/** What a person should know about how an upload was unpacked. */
export interface UnpackNotes {
  readonly leftOut: readonly LeftOut[];
  /** Formulas saved without their result: their cells are empty. */
  readonly formulasWithoutValue: number;
  /** The ending promises another kind of file than the bytes are. */
  readonly nameMisleads: boolean;
  /** Days are counted from 1904: numbers without a date style would be read as counted from 1900. */
  readonly countsFrom1904: boolean;
}

const ZIP = [0x50, 0x4b, 0x03, 0x04];
/** An archive without entries has its end only. */
const EMPTY_ZIP = [0x50, 0x4b, 0x05, 0x06];
const GZIP = [0x1f, 0x8b];
const OLD_OFFICE = [0xd0, 0xcf, 0x11, 0xe0];
/** Other archives, by their published magic numbers: 7z, xz, bzip2, rar, zstd. */
const OTHER_ARCHIVES = [
  [0x37, 0x7a, 0xbc, 0xaf],
  [0xfd, 0x37, 0x7a, 0x58],
  [0x42, 0x5a, 0x68],
  [0x52, 0x61, 0x72, 0x21],
  [0x28, 0xb5, 0x2f, 0xfd],
];
const TAR_MARK_AT = 257;
const TAR_MARK = [0x75, 0x73, 0x74, 0x61, 0x72];

const startsWith = (bytes: Uint8Array, signature: readonly number[], at = 0): boolean =>
  signature.every((byte, i) => bytes[at + i] === byte);

/** The kind of container by its first bytes, whatever its name; null for anything else. */
export function containerOf(head: Uint8Array): "zip" | "gzip" | null {
  if (startsWith(head, ZIP) || startsWith(head, EMPTY_ZIP)) return "zip";
  return startsWith(head, GZIP) ? "gzip" : null;
}

/** The old binary spreadsheet, or a newer one locked by a password: both are the same outer format. */
export function isOldOffice(head: Uint8Array): boolean {
  return startsWith(head, OLD_OFFICE);
}

/** An archive of any kind, also within an archive, where none is opened. */
export function isArchive(head: Uint8Array): boolean {
  return (
    containerOf(head) !== null ||
    OTHER_ARCHIVES.some((signature) => startsWith(head, signature)) ||
    startsWith(head, TAR_MARK, TAR_MARK_AT)
  );
}

/** The ending of a name in lower case with its point, or "" without one. */
export function endingOf(name: string): string {
  const point = name.lastIndexOf(".");
  return point <= 0 ? "" : name.slice(point).toLowerCase();
}

/** Whether a name promises another kind of file than the bytes turned out to be. */
export function nameMisleads(name: string, kind: ContainerKind): boolean {
  const wanted = { xlsx: [".xlsx", ".xlsm"], zip: [".zip"], gzip: [".gz"] } as const;
  return !(wanted[kind] as readonly string[]).includes(endingOf(name));
}

/** Endings that no log has: left out of an archive by name, and named. */
const OTHER_FILES = new Set(
  ".pdf .jpg .jpeg .png .gif .heic .webp .tif .tiff .bmp .mp4 .mov .doc .docx .ppt .pptx .rtf .htm .html .xml .json .ini .exe .dll .db".split(
    " ",
  ),
);

/** Whether a member of an archive can hold a log, by its path. */
export function mayHoldLog(path: string): boolean {
  return !OTHER_FILES.has(endingOf(path)) && !isSystemClutter(path);
}

/** What operating systems put into archives by themselves: no part of what somebody packed. */
export function isSystemClutter(path: string): boolean {
  const name = baseName(path);
  return (
    path.startsWith("__MACOSX/") ||
    name.startsWith("._") ||
    [".DS_Store", "Thumbs.db", "desktop.ini"].includes(name)
  );
}

/** The name of a path in an archive without its folders and without control characters. */
export function baseName(path: string): string {
  const last = path.split(/[\\/]/).pop() ?? "";
  return last.replace(/\p{Cc}/gu, "").trim();
}

/** `july.csv.gz` holds `july.csv`. */
export function gunzippedName(name: string): string {
  return endingOf(name) === ".gz" && name.length > 3 ? name.slice(0, -3) : name;
}
