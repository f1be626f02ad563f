import type { TextStyle } from "react-native";

import { font } from "./fonts";

/** Size and line height in px, tracking in em. Figures are tabular everywhere: columns must line up. */
function face(fontFamily: string, fontSize: number, lineHeight: number, trackingEm: number) {
  return {
    fontFamily,
    fontSize,
    lineHeight,
    letterSpacing: trackingEm * fontSize,
    fontVariant: ["tabular-nums"],
  } satisfies TextStyle;
}

export const typeScale = {
  display: face(font.ui.bold, 34, 38, -0.02),
  title: face(font.ui.bold, 26, 30, -0.018),
  heading: face(font.ui.semibold, 19, 24, -0.008),
  subhead: face(font.ui.semibold, 16, 22, 0),
  body: face(font.ui.regular, 16, 24, 0),
  bodyWide: face(font.ui.regular, 15, 22, 0),
  small: face(font.ui.regular, 13, 18, 0),
  label: face(font.ui.semibold, 13, 16, 0),
  button: face(font.ui.semibold, 16, 20, 0),
  table: face(font.narrow.medium, 15, 20, 0),
  unit: face(font.narrow.medium, 14, 18, 0),
  figureXl: face(font.ui.semibold, 44, 48, -0.02),
  figureL: face(font.ui.semibold, 30, 34, -0.015),
  figureM: face(font.ui.semibold, 20, 24, -0.01),
  figureS: face(font.ui.semibold, 15, 20, 0),
  asReadXl: face(font.mono.medium, 32, 40, -0.02),
  asReadL: face(font.mono.medium, 20, 26, -0.02),
  asReadM: face(font.mono.regular, 15, 20, -0.02),
  asReadS: face(font.mono.regular, 13, 18, -0.02),
  formula: face(font.formula.regular, 21, 32, 0),
  formulaItalic: face(font.formula.italic, 21, 32, 0),
  formulaBelow: face(font.formula.regular, 15, 18, 0),
  strongSmall: face(font.ui.semibold, 13, 18, 0),
  nav: face(font.ui.medium, 16, 20, 0),
  navOn: face(font.ui.bold, 16, 20, 0),
  barLabel: face(font.ui.medium, 13, 16, 0),
  barLabelOn: face(font.ui.bold, 13, 16, 0),
  chip: face(font.narrow.medium, 14, 18, 0),
  tableHead: face(font.narrow.semibold, 14, 18, 0),
  fieldLabel: face(font.ui.semibold, 14, 18, 0),
  wordmark: face(font.ui.bold, 19, 23, -0.025),
  wordmarkPhone: face(font.ui.bold, 38, 42, -0.032),
  wordmarkWide: face(font.ui.bold, 56, 60, -0.032),
  lead: face(font.ui.regular, 22, 31, 0),
};

export type TypeName = keyof typeof typeScale;
