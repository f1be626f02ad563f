import path from "node:path";
import type { Entry } from "yauzl";
import {
  builtInDateStyle,
  dateStyleOf,
  type DateStyle,
  type DateSystem,
} from "@shared/domain/log-files/sheet-cells";
import type { ZipArchive } from "./read-zip";
import { UnpackRefused } from "./unpack-refused";
import { readXml } from "./xml-events";

/** Memory that the texts of a workbook may take: over a million short ones. */
const MAX_TEXT_BYTES = 96 * 1024 * 1024;
/** A text's own cost beside its characters. */
const BYTES_A_TEXT = 40;

export interface Sheet {
  readonly name: string;
  readonly isHidden: boolean;
  readonly entry: Entry;
}

/** What the cells of every sheet refer to. */
export interface Workbook {
  readonly sheets: readonly Sheet[];
  readonly system: DateSystem;
  /** By style number of a cell. */
  readonly styles: readonly (DateStyle | null)[];
  readonly texts: readonly string[];
}

const WORKBOOK = "xl/workbook.xml";

export function isWorkbook(archive: ZipArchive): boolean {
  return archive.entries.some(({ fileName }) => fileName === WORKBOOK);
}

/** Spreadsheets whose sheets are no XML of this kind: OpenDocument, and the binary workbook. */
export function isOtherSpreadsheet(archive: ZipArchive): boolean {
  const names = archive.entries.map(({ fileName }) => fileName);
  return (
    names.includes("xl/workbook.bin") ||
    (names.includes("mimetype") && names.includes("content.xml"))
  );
}

/** Reads what stands beside the sheets: their names, styles and shared texts. */
export async function readWorkbook(archive: ZipArchive): Promise<Workbook> {
  const find = (name: string): Entry | undefined =>
    archive.entries.find(({ fileName }) => fileName === name);
  const read = async (name: string, handlers: Parameters<typeof readXml>[2]): Promise<void> => {
    const entry = find(name);
    if (entry) await readXml(name, archive.read(entry), handlers);
  };

  const targets = new Map<string, string>();
  await read("xl/_rels/workbook.xml.rels", {
    open(name, attribute) {
      const id = attribute("Id");
      const target = attribute("Target");
      if (name !== "Relationship" || id === undefined || target === undefined) return;
      // A chart's sheet and a link to another file hold no rows.
      if (attribute("Type")?.endsWith("/worksheet")) targets.set(id, partName(target));
    },
  });
  let system: DateSystem = 1900;
  const sheets: Sheet[] = [];
  await read(WORKBOOK, {
    open(name, attribute) {
      if (name === "workbookPr" && isTrue(attribute("date1904"))) system = 1904;
      if (name !== "sheet") return;
      const target = targets.get(attribute("id") ?? "");
      const entry = target === undefined ? undefined : find(target);
      if (entry === undefined) return;
      const isHidden = (attribute("state") ?? "visible") !== "visible";
      sheets.push({ name: (attribute("name") ?? "").slice(0, 100), isHidden, entry });
    },
  });
  return {
    sheets,
    system,
    styles: await readStyles(read),
    texts: await readTexts(read),
  };
}

type Read = (name: string, handlers: Parameters<typeof readXml>[2]) => Promise<void>;

async function readStyles(read: Read): Promise<(DateStyle | null)[]> {
  const codes = new Map<string, DateStyle | null>();
  const styles: (DateStyle | null)[] = [];
  let isOfCells = false;
  await read("xl/styles.xml", {
    open(name, attribute) {
      if (name === "cellXfs") isOfCells = true;
      const id = attribute("numFmtId") ?? "0";
      if (name === "numFmt") codes.set(id, dateStyleOf(attribute("formatCode") ?? ""));
      if (name !== "xf" || !isOfCells) return;
      const own = codes.get(id);
      styles.push(own === undefined ? builtInDateStyle(Number(id)) : own);
    },
    close(name) {
      if (name === "cellXfs") isOfCells = false;
    },
  });
  return styles;
}

async function readTexts(read: Read): Promise<string[]> {
  const texts: string[] = [];
  let text = "";
  let bytes = 0;
  let isText = false;
  let isPhonetic = false;
  await read("xl/sharedStrings.xml", {
    open(name) {
      if (name === "si") text = "";
      if (name === "rPh") isPhonetic = true;
      if (name === "t") isText = !isPhonetic;
    },
    text(piece) {
      if (isText) text += piece;
    },
    close(name) {
      if (name === "t") isText = false;
      if (name === "rPh") isPhonetic = false;
      if (name !== "si") return;
      bytes += text.length + BYTES_A_TEXT;
      if (bytes > MAX_TEXT_BYTES)
        throw new UnpackRefused("archiveTooLarge", "xl/sharedStrings.xml");
      texts.push(text);
    },
  });
  return texts;
}

/** A target is meant from the workbook's folder, or from the root of the archive. */
function partName(target: string): string {
  return target.startsWith("/") ? target.slice(1) : path.posix.join("xl", target);
}

function isTrue(value: string | undefined): boolean {
  return value === "1" || value === "true";
}
