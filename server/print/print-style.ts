import path from "node:path";
import type { Content, TFontDictionary } from "pdfmake/interfaces";

const fontFolder = path.resolve(__dirname, "..", "..", "assets", "fonts");
const font = (name: string) => path.join(fontFolder, `${name}.ttf`);

/** Inks of printed pages, after the screen's light theme; dark enough on grey printers. */
export const PAPER = {
  fontFolder,
  ink: "#0F1F2E",
  soft: "#3F4E5A",
  faint: "#56636C",
  rule: "#CBD2C3",
  grid: "#EEF2E9",
  slate: "#6C7A83",
  brass: "#A67C00",
  madder: "#C23B66",
} as const;

export const printFonts: TFontDictionary = {
  Archivo: { normal: font("Archivo_400Regular"), bold: font("Archivo_600SemiBold") },
  Spline: { normal: font("SplineSansMono_400Regular"), bold: font("SplineSansMono_500Medium") },
  Stix: {
    normal: font("STIXTwoText_400Regular"),
    italics: font("STIXTwoText_400Regular_Italic"),
  },
};

const squarePt = 14;

/** Squared computation paper, faint enough to write on. */
export function paperBackground(
  _page: number,
  { width, height }: { width: number; height: number },
): Content {
  const line = { type: "line" as const, lineWidth: 0.4, lineColor: PAPER.grid };
  const steps = (length: number) =>
    Array.from({ length: Math.floor(length / squarePt) }, (_, at) => (at + 1) * squarePt);
  return {
    canvas: [
      ...steps(width).map((x) => ({ ...line, x1: x, y1: 0, x2: x, y2: height })),
      ...steps(height).map((y) => ({ ...line, x1: 0, y1: y, x2: width, y2: y })),
    ],
  };
}
