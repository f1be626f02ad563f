import { buffer } from "node:stream/consumers";
import { ZipFile } from "yazl";

export type Part = string | Buffer;

/** A zip archive of named parts, in order. */
export async function zipOf(
  parts: Readonly<Record<string, Part>>,
  compress = true,
): Promise<Buffer> {
  const zip = new ZipFile();
  for (const [name, content] of Object.entries(parts))
    zip.addBuffer(Buffer.isBuffer(content) ? content : Buffer.from(content), name, {
      compress,
      mtime: new Date(Date.UTC(2026, 4, 18)),
    });
  zip.end();
  return buffer(zip.outputStream);
}

/** A cell as a workbook stores it. */
export type Cell =
  | null
  | string
  | number
  | {
      readonly raw: string;
      readonly type?: string;
      readonly style?: number;
      readonly formula?: string;
    };

export interface SheetPlan {
  readonly rows: readonly (readonly Cell[])[];
  readonly hidden?: boolean;
  /** Row number of each row; 1, 2, 3 … without. */
  readonly rowNumbers?: readonly number[];
}

export interface WorkbookPlan {
  readonly sheets: Readonly<Record<string, SheetPlan>>;
  readonly date1904?: boolean;
  readonly sharedStrings?: boolean;
  /** Parts that stand in for, or beside, those made from the plan. */
  readonly parts?: Readonly<Record<string, Part>>;
}

/** Cell styles of every generated workbook, by number. */
export const STYLE = { general: 0, dateTime: 1, date: 2, time: 3, twoDecimals: 4 } as const;

const styles = `<?xml version="1.0" encoding="UTF-8"?>
<styleSheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">
<numFmts count="1"><numFmt numFmtId="164" formatCode="dd/mm/yyyy\\ hh:mm:ss"/></numFmts>
<cellStyleXfs><xf numFmtId="22"/></cellStyleXfs>
<cellXfs count="5"><xf numFmtId="0"/><xf numFmtId="164"/><xf numFmtId="14"/><xf numFmtId="21"/><xf numFmtId="2"/></cellXfs>
</styleSheet>`;

const escape = (text: string) =>
  text.replace(/&/g, "&amp;").replace(/</g, "&lt;").replace(/"/g, "&quot;");

export function columnName(index: number): string {
  const letter = String.fromCharCode(65 + (index % 26));
  return index < 26 ? letter : columnName(Math.floor(index / 26) - 1) + letter;
}

/** A workbook as ECMA-376 has it, down to the parts a reader needs. */
export async function workbookOf(plan: WorkbookPlan): Promise<Buffer> {
  const names = Object.keys(plan.sheets);
  const texts: string[] = [];
  const cellXml = (cell: Cell, at: string): string => {
    if (cell === null) return "";
    if (typeof cell === "number") return `<c r="${at}"><v>${cell}</v></c>`;
    if (typeof cell !== "string") {
      const attributes = `${cell.style === undefined ? "" : ` s="${cell.style}"`}${cell.type ? ` t="${cell.type}"` : ""}`;
      const formula = cell.formula === undefined ? "" : `<f>${escape(cell.formula)}</f>`;
      const value = cell.raw === "" ? "" : `<v>${escape(cell.raw)}</v>`;
      return `<c r="${at}"${attributes}>${formula}${value}</c>`;
    }
    if (plan.sharedStrings === false)
      return `<c r="${at}" t="inlineStr"><is><t>${escape(cell)}</t></is></c>`;
    return `<c r="${at}" t="s"><v>${texts.push(cell) - 1}</v></c>`;
  };
  const sheetXml = ({ rows, rowNumbers }: SheetPlan): string => {
    const body = rows.map((row, i) => {
      const number = rowNumbers?.[i] ?? i + 1;
      const cells = row.map((cell, k) => cellXml(cell, `${columnName(k)}${number}`));
      return `<row r="${number}">${cells.join("")}</row>`;
    });
    return `<?xml version="1.0"?><worksheet><sheetData>${body.join("")}</sheetData></worksheet>`;
  };
  const parts: Record<string, Part> = {
    "[Content_Types].xml": "<Types/>",
    "xl/workbook.xml": `<workbook xmlns:r="http://schemas.openxmlformats.org/officeDocument/2006/relationships"><workbookPr${plan.date1904 ? ' date1904="1"' : ""}/><sheets>${names
      .map(
        (name, i) =>
          `<sheet name="${escape(name)}" sheetId="${i + 1}"${plan.sheets[name]?.hidden ? ' state="hidden"' : ""} r:id="rId${i + 1}"/>`,
      )
      .join("")}</sheets></workbook>`,
    "xl/_rels/workbook.xml.rels": `<Relationships>${names
      .map(
        (_, i) =>
          `<Relationship Id="rId${i + 1}" Type="http://schemas.openxmlformats.org/officeDocument/2006/relationships/worksheet" Target="worksheets/sheet${i + 1}.xml"/>`,
      )
      .join("")}</Relationships>`,
    "xl/styles.xml": styles,
  };
  names.forEach((name, i) => {
    parts[`xl/worksheets/sheet${i + 1}.xml`] = sheetXml(plan.sheets[name] as SheetPlan);
  });
  parts["xl/sharedStrings.xml"] =
    `<sst>${texts.map((text) => `<si><t xml:space="preserve">${escape(text)}</t></si>`).join("")}</sst>`;
  return zipOf({ ...parts, ...plan.parts });
}
