import path from "node:path";
import pdfmake from "pdfmake";
import type { Content, TableCell, TDocumentDefinitions } from "pdfmake/interfaces";
import type { Workings } from "@shared/contracts/workings";
import type { UnitSystem } from "@shared/domain/units/display-units";
import { makeFormat, type Format } from "@shared/formats/format";
import type { Language } from "@shared/formats/language";
import { NO_BREAK_SPACE } from "@shared/formats/numbers";
import type { FormulaPart } from "@shared/workings/formula";
import type { Words } from "@shared/workings/words";
import { workingsText, type Line, type WorkingsText } from "@shared/workings/workings-text";
import { workingsWords } from "@server/words/workings-words";
import { PAPER, paperBackground, printFonts } from "./print-style";

export interface PrintedFor {
  readonly language: Language;
  readonly unitSystem: UnitSystem;
  readonly nowMs: number;
}

/** The workings on A4 paper, in the words of the screen and the units of the site. */
export async function printWorkings(model: Workings, printed: PrintedFor): Promise<Buffer> {
  const t = workingsWords(printed.language);
  const format = makeFormat(printed.language, printed.unitSystem, model.subject.zone);
  const text = workingsText(model, t, format);
  pdfmake.setFonts(printFonts);
  // The document names no address and no file but the fonts: nothing else may be read.
  pdfmake.setUrlAccessPolicy(() => false);
  pdfmake.setLocalAccessPolicy((file) => path.dirname(path.resolve(file)) === PAPER.fontFolder);
  return pdfmake.createPdf(definition(model, text, t, format, printed)).getBuffer();
}

function definition(
  model: Workings,
  text: WorkingsText,
  t: Words,
  format: Format,
  { language, nowMs }: PrintedFor,
): TDocumentDefinitions {
  const { subject } = model;
  const made = t("pdf.madeAt", {
    when: `${format.date(nowMs, "dayMonthYear")}, ${format.time(nowMs)}`,
  });
  return {
    pageSize: "A4",
    pageMargins: [48, 40, 48, 46],
    language,
    info: { title: `${text.title}: ${text.subject}`, creator: "Loopwright" },
    background: paperBackground,
    defaultStyle: { font: "Archivo", fontSize: 9.5, lineHeight: 1.15, color: PAPER.ink },
    footer: (page, pages) => ({
      margin: [48, 14, 48, 0],
      fontSize: 8,
      color: PAPER.faint,
      columns: [
        { text: `Loopwright · ${made}${subject.isDemo ? ` · ${t("pdf.demo")}` : ""}` },
        { text: t("pdf.page", { page, pages }), alignment: "right" },
      ],
    }),
    content: [
      {
        columns: [
          { text: text.title, fontSize: 18, bold: true },
          {
            text: `${subject.siteName}\n${subject.loopTag} ${subject.loopName}, ${subject.pointCode}`,
            alignment: "right",
            color: PAPER.soft,
          },
        ],
      },
      { text: text.subject, color: PAPER.soft, margin: [0, 6, 0, 0] },
      figureLine(text),
      ...cautions(text),
      ...text.formula.map(formulaLine),
      { text: text.formulaSaid, color: PAPER.soft },
      ...byHand(text),
      ...inputs(text),
      ...budget(text, t),
      ...rows(model, text),
      ...lines(text.installations.title, text.installations.rows, text.installations.none),
      ...lines(text.corrections.title, text.corrections.rows, null),
      ...lines(text.fills.title, text.fills.rows, null),
      ...(text.fills.rows.length > 0 ? [{ text: text.fills.note, color: PAPER.soft }] : []),
      ...files(text),
      {
        columnGap: 24,
        columns: [
          pairs(text.basis.title, text.basis.rows),
          pairs(
            text.formulasFrom.title,
            text.formulasFrom.rows.map(({ name, forWhat }) => ({ label: name, value: forWhat })),
          ),
        ],
      },
    ],
  };
}

function figureLine({ figure }: WorkingsText): Content {
  return {
    margin: [0, 0, 0, 2],
    text: [
      { text: figure.value, fontSize: 30, bold: true },
      ...(figure.uncertainty === null
        ? []
        : [{ text: ` ±${NO_BREAK_SPACE}${figure.uncertainty}`, fontSize: 16, color: PAPER.soft }]),
      { text: `${NO_BREAK_SPACE}${figure.unit}`, fontSize: 14, color: PAPER.soft },
    ],
  };
}

function cautions({ cautions: found }: WorkingsText): Content[] {
  return found.rows.map(({ text }) => ({
    columns: [
      { width: 10, text: "!", bold: true },
      { width: "*", text, color: PAPER.ink },
    ],
    margin: [0, 1, 0, 1],
  }));
}

function formulaLine(parts: readonly FormulaPart[]): Content {
  return {
    margin: [0, 6, 0, 2],
    text: parts.flatMap(({ text, italic, below }) => [
      { text, font: "Stix", italics: italic, fontSize: 16 },
      ...(below === undefined
        ? []
        : [{ text: below, font: "Stix", italics: false, fontSize: 16, sub: true }]),
    ]),
  };
}

function byHand({ byHand: check }: WorkingsText): Content[] {
  if (check === null) return [];
  return [
    {
      margin: [0, 4, 0, 0],
      text: [
        { text: `${check.label}  `, color: PAPER.soft },
        { text: check.sum, bold: true },
        { text: check.note === "" ? "" : `  ${check.note}`, color: PAPER.soft },
      ],
    },
  ];
}

function heading(text: string): Content {
  return { text, fontSize: 11.5, bold: true, margin: [0, 12, 0, 3] };
}

/** Rows between hairlines; a table may run over a page, a row may not. */
function ruled(widths: (string | number)[], body: TableCell[][]): Content {
  return {
    table: { widths, body, dontBreakRows: true },
    layout: {
      hLineWidth: (line) => (line === 0 || line === body.length ? 0 : 0.5),
      vLineWidth: () => 0,
      hLineColor: () => PAPER.rule,
      paddingLeft: (column) => (column === 0 ? 0 : 6),
      paddingRight: () => 0,
      paddingTop: () => 2.5,
      paddingBottom: () => 1.5,
    },
  };
}

/** Kept on one page with its heading; only a list of many files may run over. */
function section(title: string, content: Content, runsOver = false): Content[] {
  return [{ unbreakable: !runsOver, stack: [heading(title), content] }];
}

function inputs({ inputs: put }: WorkingsText): Content[] {
  if (put.rows.length === 0) return [];
  const body = put.rows.map((row): TableCell[] => [
    {
      text: [
        { text: row.symbol.text, font: "Stix", italics: true, fontSize: 12 },
        ...(row.symbol.below === undefined
          ? []
          : [{ text: row.symbol.below, font: "Stix", italics: false, fontSize: 12, sub: true }]),
      ],
    },
    { text: [row.label, { text: `  ${row.detail}`, color: PAPER.soft }] },
    {
      alignment: "right",
      text: [
        { text: row.value, ...(row.asRead ? { font: "Spline" } : { bold: true }) },
        { text: `${NO_BREAK_SPACE}${row.unit}`, color: PAPER.soft },
      ],
    },
  ]);
  return section(put.title, ruled([18, "*", "auto"], body));
}

const barWidth = 90;

function budget({ budget: found }: WorkingsText, t: Words): Content[] {
  if (found === null) return section(t("budget.title"), { text: t("budget.none") });
  const body = found.rows.map((row): TableCell[] => [
    { text: [row.label, { text: `  ${row.detail}`, color: PAPER.soft }] },
    {
      canvas: [
        { type: "rect", x: 0, y: 3, w: Math.max(1, row.share * barWidth), h: 6, color: PAPER.ink },
      ],
    },
    { text: row.percent, alignment: "right" },
  ]);
  const total = (label: string, value: string): TableCell[] => [
    { text: label, bold: true },
    { text: value, bold: true, alignment: "right", colSpan: 2 },
    {},
  ];
  body.push(
    total(found.together.label, found.together.value),
    total(found.times.label, found.times.value),
  );
  return [
    ...section(found.title, ruled(["*", barWidth, 56], body)),
    ...found.notes.map((note) => ({ text: note, color: PAPER.soft })),
  ];
}

const stripWidth = 499;

function rows({ rows: counts }: Workings, { rows: text }: WorkingsText): Content[] {
  const kinds = [
    { count: counts.measured, color: PAPER.slate },
    { count: counts.filled, color: PAPER.brass },
    { count: counts.excluded + counts.noReading, color: PAPER.madder },
    { count: counts.missing ?? 0, color: null },
  ].filter(({ count }) => count > 0);
  const all = kinds.reduce((sum, { count }) => sum + count, 0);
  // Little trouble must be seen: it gets some width, and the rest shares what is left.
  const least = 8;
  const widths = kinds.map(({ count }) => Math.max(least, (count / all) * stripWidth));
  const scale = stripWidth / widths.reduce((sum, width) => sum + width, 0);
  let x = 0;
  const strip = kinds.map(({ color }, at) => {
    const w = (widths[at] ?? 0) * scale;
    const rect = { type: "rect" as const, x, y: 2, w: Math.max(1, w - 2), h: 8 };
    x += w;
    return color === null
      ? { ...rect, lineColor: PAPER.slate, dash: { length: 2, space: 2 }, lineWidth: 0.8 }
      : { ...rect, color };
  });
  return section(text.title, {
    stack: [
      ...(strip.length > 0 ? [{ canvas: strip }] : []),
      { text: [text.sentence, ...(text.covered === null ? [] : [`. ${text.covered}`])] },
    ],
  });
}

function lines(title: string, found: readonly Line[], none: string | null): Content[] {
  if (found.length === 0) return none === null ? [] : section(title, { text: none });
  const body = found.map(({ lead, detail }): TableCell[] => [
    { text: [{ text: lead, bold: true }, `  ${detail}`] },
  ]);
  return section(title, ruled(["*"], body));
}

function files({ files: found }: WorkingsText): Content[] {
  if (found.rows.length === 0) return [];
  const body = found.rows.map(({ lead, detail, hash }): TableCell[] => [
    {
      text: [
        { text: lead, bold: true },
        `  ${detail}\n`,
        { text: hash, font: "Spline", fontSize: 7.5 },
      ],
    },
  ]);
  return section(found.title, ruled(["*"], body), body.length > 8);
}

function pairs(
  title: string,
  found: readonly { readonly label: string; readonly value: string }[],
): Content {
  const body = found.map(({ label, value }): TableCell[] => [
    { text: label },
    { text: value, alignment: "right", color: PAPER.soft },
  ]);
  return {
    unbreakable: true,
    stack: body.length === 0 ? [] : [heading(title), ruled(["auto", "*"], body)],
  };
}
