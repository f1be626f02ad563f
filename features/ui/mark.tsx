import { View } from "react-native";
import Svg, { Circle, Path, Rect } from "react-native-svg";

import { useWords } from "@features/i18n";

import { Row } from "./stack";
import { Text } from "./text";
import { useTheme, type TypeName } from "./theme";

/** How serious something is. Fine is quiet: a tick in ink, never green. */
export type MarkKind = "fine" | "note" | "look" | "wrong";

export interface MarkProps {
  kind: MarkKind;
  size?: number;
  /** True where words beside it already say it. */
  silent?: boolean;
}

export function Mark({ kind, size = 20, silent }: MarkProps) {
  const t = useWords("ui");
  const said = silent
    ? { "aria-hidden": true }
    : { role: "img" as const, "aria-label": t(`mark.${kind}`) };
  return (
    <View {...said} style={{ width: size, height: size, flexShrink: 0 }}>
      <Svg width={size} height={size} viewBox="0 0 20 20">
        <MarkDrawing kind={kind} />
      </Svg>
    </View>
  );
}

function MarkDrawing({ kind }: { kind: MarkKind }) {
  const { colour } = useTheme();
  const round = { strokeLinecap: "round", strokeLinejoin: "round", fill: "none" } as const;
  switch (kind) {
    case "fine":
      return <Path d="M4 10.5l4 4 8-9" {...round} stroke={colour.ink} strokeWidth={2.4} />;
    case "note":
      return (
        <>
          <Circle cx={10} cy={10} r={8.5} fill="none" stroke={colour.ink2} strokeWidth={1.8} />
          <Path d="M10 9v5.5" {...round} stroke={colour.ink2} strokeWidth={2} />
          <Circle cx={10} cy={6} r={1.2} fill={colour.ink2} />
        </>
      );
    case "look":
      return (
        <>
          <Path d="M10 .8L19.2 10 10 19.2.8 10z" fill={colour.brass} />
          <Path d="M10 5.5v5.5" {...round} stroke={colour.onBrass} strokeWidth={2.2} />
          <Circle cx={10} cy={14} r={1.3} fill={colour.onBrass} />
        </>
      );
    case "wrong":
      return (
        <>
          <Rect x={1.5} y={1.5} width={17} height={17} rx={3} fill={colour.madder} />
          <Path
            d="M6.5 6.5l7 7M13.5 6.5l-7 7"
            {...round}
            stroke={colour.onMadder}
            strokeWidth={2.2}
          />
        </>
      );
  }
}

/** A mark with its words, which marks on screen always have. */
export function MarkedText(props: { kind: MarkKind; variant?: TypeName; children: string }) {
  return (
    <Row gap={2}>
      <Mark kind={props.kind} size={18} silent />
      <Text variant={props.variant ?? "body"}>{props.children}</Text>
    </Row>
  );
}
