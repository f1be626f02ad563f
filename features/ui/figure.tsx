import { Pressable, Text as NativeText, View } from "react-native";

import { formatFigure, NO_BREAK_SPACE, useFormat, useWords } from "@features/i18n";

import { MarkLine } from "./mark-line";
import { pressOpacity } from "./press-style";
import { typeScale, useTheme, type TypeName } from "./theme";
import { VisuallyHidden } from "./visually-hidden";
import { DottedRule } from "./dotted-rule";

export interface FigureProps {
  /** Null is unknown and shows a dash, never 0. */
  value: number | null;
  unit: string;
  /** Half width of the 95 % interval in the same unit; null while it is not worked out. */
  uncertainty?: number | null;
  /** Places without a ±; with one, both stop where two figures of the ± stop. */
  places?: number;
  size?: "xl" | "l" | "m" | "s";
  /** Came off an instrument or a file (mono), not worked out by us. */
  asRead?: boolean;
  /** Words in front, for screen readers: “Cooling energy, week 20”. */
  said?: string;
  /** Opens the workings: shows the dotted line and makes the figure a button. */
  onOpenWorkings?: () => void;
  /** Its workings are open beside the page: it is marked, and a line leads to them. */
  workingsOpen?: boolean;
}

interface Faces {
  readonly value: TypeName;
  readonly uncertaintySize: number;
  readonly unitSize: number;
}

const faces: Record<NonNullable<FigureProps["size"]>, Faces> = {
  xl: { value: "figureXl", uncertaintySize: 20, unitSize: 18 },
  l: { value: "figureL", uncertaintySize: 16, unitSize: 15 },
  m: { value: "figureM", uncertaintySize: 15, unitSize: 14 },
  s: { value: "figureS", uncertaintySize: 14, unitSize: 14 },
};

const readFaces: Record<NonNullable<FigureProps["size"]>, TypeName> = {
  xl: "asReadXl",
  l: "asReadL",
  m: "asReadM",
  s: "asReadM",
};

/**
 * A value with its unit and its ±. Screen readers hear it whole: “14,940 plus or minus 500 kilowatt
 * hours, button, show workings”.
 */
export function Figure(props: FigureProps) {
  const { value, unit, uncertainty = null, size = "m", asRead, onOpenWorkings } = props;
  const { colour } = useTheme();
  const t = useWords("ui");
  const { language } = useFormat();
  const text = formatFigure(value, uncertainty, language, props.places);
  const face = faces[size];
  const said = useSaidFigure(props);
  const muted = { color: colour.ink3, fontSize: face.uncertaintySize };

  const picture = (
    <NativeText
      aria-hidden
      style={[typeScale[asRead ? readFaces[size] : face.value], { color: colour.ink }]}
    >
      {text.value}
      {text.uncertainty === null ? null : (
        <NativeText style={[typeScale.body, muted]}>
          {` ±${NO_BREAK_SPACE}${text.uncertainty}`}
        </NativeText>
      )}
      {value === null || unit === "" ? null : (
        <NativeText style={[typeScale.unit, { color: colour.ink3, fontSize: face.unitSize }]}>
          {NO_BREAK_SPACE}
          {unit}
        </NativeText>
      )}
    </NativeText>
  );

  if (!onOpenWorkings) {
    return (
      <View style={{ alignSelf: "flex-start" }}>
        {picture}
        <VisuallyHidden>{said}</VisuallyHidden>
      </View>
    );
  }
  return (
    <Pressable
      role="button"
      aria-label={t("figure.withWorkings", { figure: said })}
      aria-expanded={props.workingsOpen}
      onPress={onOpenWorkings}
      hitSlop={10}
      style={({ pressed }) => [
        { alignSelf: "flex-start", gap: 2 },
        props.workingsOpen ? { backgroundColor: colour.markTint } : null,
        pressOpacity(pressed),
      ]}
    >
      {picture}
      {props.workingsOpen ? <MarkLine /> : <DottedRule />}
    </Pressable>
  );
}

/** The figure as a sentence for screen readers, with the unit in words. */
export function useSaidFigure(props: FigureProps): string {
  const t = useWords("ui");
  const { language } = useFormat();
  const { value, uncertainty = null, unit, said } = props;
  const before = said ? `${said}: ` : "";
  if (value === null || Number.isNaN(value)) return `${before}${t("figure.unknown")}`;
  const text = formatFigure(value, uncertainty, language, props.places);
  const unitSaid = unit === "" ? "" : t(`units.${unitKey(unit)}`, { defaultValue: unit });
  const key = text.uncertainty === null ? "figure.plain" : "figure.withUncertainty";
  const sentence = t(key, { value: text.value, uncertainty: text.uncertainty, unit: unitSaid });
  return `${before}${sentence}`.trim();
}

/** Key of a unit's spoken name: letters only, so that dots and slashes never split a key. */
function unitKey(unit: string): string {
  return unit
    .replace(/³/g, "3")
    .replace(/²/g, "2")
    .replace(/°/g, "deg")
    .replace(/%/g, "percent")
    .replace(/[^A-Za-z0-9]/g, "");
}
