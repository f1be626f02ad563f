import { Text as NativeText, View } from "react-native";

import { typeScale, useTheme, webStyle } from "./theme";

/** A piece of a formula: a symbol in italics or an upright sign, with what hangs below it. */
export interface FormulaPiece {
  readonly text: string;
  readonly italic: boolean;
  readonly below?: string;
}

/** Formulas as set in books, a line each. Who listens hears `said` instead of the signs. */
export function Formula(props: { lines: readonly (readonly FormulaPiece[])[]; said: string }) {
  const { colour } = useTheme();
  return (
    <View role="img" aria-label={props.said}>
      {props.lines.map((pieces, line) => (
        <NativeText
          key={line}
          aria-hidden
          style={[typeScale.formula, { color: colour.ink }, webStyle({ whiteSpace: "pre-wrap" })]}
        >
          {pieces.map((piece, at) => (
            <FormulaSymbol key={at} piece={piece} />
          ))}
        </NativeText>
      ))}
    </View>
  );
}

/** One symbol, also alone in front of what it stands for. */
export function FormulaSymbol({ piece }: { piece: FormulaPiece }) {
  const { colour } = useTheme();
  const face = piece.italic ? typeScale.formulaItalic : typeScale.formula;
  return (
    <NativeText style={[face, { color: colour.ink }]}>
      {piece.text}
      {piece.below === undefined ? null : (
        <NativeText style={[typeScale.formulaBelow, webStyle({ position: "relative", top: 5 })]}>
          {piece.below}
        </NativeText>
      )}
    </NativeText>
  );
}
