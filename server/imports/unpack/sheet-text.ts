import { MAX_ROW_BYTES } from "@shared/domain/log-files/row-tokeniser";
import {
  columnOfReference,
  dateText,
  MAX_SHEET_COLUMNS,
  MAX_SHEET_ROWS,
  numberText,
  oneLineText,
  quotedCell,
} from "@shared/domain/log-files/sheet-cells";
import type { Workbook } from "./read-workbook";
import { UnpackRefused } from "./unpack-refused";
import { XmlEvents } from "./xml-events";

/** Text is handed on in pieces of about this many characters. */
const PIECE = 1 << 16;

/**
 * A sheet as text: one line a row at the row's own number, cells apart by tabs at their own columns.
 * A formula gives the result saved beside it and nothing where none was saved.
 */
export class SheetText {
  /** Cells with something in them. */
  filledCells = 0;
  formulasWithoutValue = 0;

  private readonly pieces: string[] = [];
  private held = 0;
  private line = 1;
  private row: string[] = [];
  private rowNumber = 0;
  private rowLength = 0;
  private column = -1;
  private type = "n";
  private style = -1;
  private value = "";
  private hasValue = false;
  private hasFormula = false;
  private inValue = false;
  private isPhonetic = false;

  constructor(
    private readonly name: string,
    private readonly workbook: Workbook,
    private readonly bound: (bytes: number) => void,
  ) {}

  async *read(chunks: AsyncIterable<Buffer>): AsyncGenerator<Buffer> {
    let events: XmlEvents | null = null;
    for await (const chunk of chunks) {
      events ??= new XmlEvents(this.name, this.handlers(), chunk);
      events.push(chunk);
      if (this.held > PIECE) yield this.take();
    }
    if (events === null) throw new UnpackRefused("archiveBroken", this.name);
    events.end();
    yield this.take();
  }

  private take(): Buffer {
    const bytes = Buffer.from(this.pieces.join(""), "utf8");
    this.pieces.length = 0;
    this.held = 0;
    this.bound(bytes.length);
    return bytes;
  }

  private handlers(): ConstructorParameters<typeof XmlEvents>[1] {
    return {
      open: (name, attribute) => {
        if (name === "row") this.openRow(attribute("r"));
        else if (name === "c") this.openCell(attribute("r"), attribute("t"), attribute("s"));
        else if (name === "v") {
          this.inValue = true;
          this.hasValue = true;
        } else if (name === "t") this.inValue = this.type === "inlineStr" && !this.isPhonetic;
        else if (name === "rPh") this.isPhonetic = true;
        else if (name === "f") this.hasFormula = true;
      },
      text: (piece) => {
        if (this.inValue) this.value += piece;
      },
      close: (name) => {
        if (name === "v" || name === "t") this.inValue = false;
        else if (name === "rPh") this.isPhonetic = false;
        else if (name === "c") this.closeCell();
        else if (name === "row") this.closeRow();
      },
    };
  }

  private openRow(reference: string | undefined): void {
    const number = reference === undefined ? this.rowNumber + 1 : Number(reference);
    // A row before the last one, or past the end of any sheet, would break the numbers of all others.
    if (!Number.isInteger(number) || number <= this.rowNumber || number > MAX_SHEET_ROWS)
      throw new UnpackRefused("archiveBroken", this.name, this.rowNumber + 1);
    this.rowNumber = number;
    this.row = [];
    this.rowLength = 0;
    this.column = -1;
  }

  private openCell(
    reference: string | undefined,
    type: string | undefined,
    style: string | undefined,
  ): void {
    this.column = reference === undefined ? this.column + 1 : columnOfReference(reference);
    if (this.column < 0 || this.column >= MAX_SHEET_COLUMNS)
      throw new UnpackRefused("archiveBroken", this.name, this.rowNumber);
    this.type = type ?? "n";
    this.style = style === undefined ? -1 : Number(style);
    this.value = "";
    this.hasValue = false;
    this.hasFormula = false;
  }

  private closeCell(): void {
    if (this.hasFormula && !this.hasValue) this.formulasWithoutValue++;
    const text = quotedCell(oneLineText(this.cellText()));
    if (text === "") return;
    this.filledCells++;
    this.rowLength += text.length;
    // The tokeniser takes no longer row, and the same text may be named by every cell.
    if (this.rowLength > MAX_ROW_BYTES)
      throw new UnpackRefused("archiveTooLarge", this.name, this.rowNumber);
    this.row[this.column] = text;
  }

  private cellText(): string {
    const { value, type, workbook } = this;
    switch (type) {
      case "s":
        return workbook.texts[Number(value)] ?? "";
      case "b":
        return value === "1" || value === "true" ? "TRUE" : value === "" ? "" : "FALSE";
      case "str":
      case "inlineStr":
      case "e":
        return value;
      case "d":
        return value.replace(/Z$/, "");
      default: {
        if (value === "") return "";
        const style = workbook.styles[this.style] ?? null;
        const date = style === null ? null : dateText(Number(value), style, workbook.system);
        return date ?? numberText(value);
      }
    }
  }

  private closeRow(): void {
    if (this.row.length === 0) return;
    // Join leaves holes empty, and every empty row keeps its line.
    const text = `${"\n".repeat(this.rowNumber - this.line)}${this.row.join("\t")}\n`;
    this.line = this.rowNumber + 1;
    this.pieces.push(text);
    this.held += text.length;
  }
}
