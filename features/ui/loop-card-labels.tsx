import { View } from "react-native";
import Svg, { Path } from "react-native-svg";

import { formatNumber, NO_BREAK_SPACE, sensiblePlaces, useFormat } from "@features/i18n";

import { useSaidFigure } from "./figure";
import type { ShownValue } from "./loop-card";
import { Inline, Text } from "./text";
import { useTheme } from "./theme";
import { VisuallyHidden } from "./visually-hidden";

/** A reading that breaks the pipe it belongs to; with clamps when it is the metered flow. */
export function PipeLabel(props: {
  edge: "top" | "bottom";
  side: "left" | "right";
  name: string;
  nameHidden?: boolean;
  shown: ShownValue | undefined;
  ground: "sheet" | "pad";
  /** Stroke of the pipe the clamps sit on, px. */
  clamps?: number;
}) {
  const { colour } = useTheme();
  const { language } = useFormat();
  const shown = props.shown ?? { value: null, unit: "" };
  const said = useSaidFigure({ ...shown, said: props.name });
  if (!props.shown) return null;
  const { value, unit } = props.shown;
  const places = props.shown.places ?? sensiblePlaces(value ?? 0);
  const at = props.edge === "top" ? { top: 1 } : { bottom: 1 };
  const from = props.side === "left" ? { left: 37 } : { right: 46 };
  return (
    <View style={{ position: "absolute", flexDirection: "row", ...at, ...from }}>
      {props.clamps !== undefined ? (
        <View aria-hidden>
          <Svg width={24} height={26}>
            <Path d={clampPath(props.clamps)} fill={colour.ink} />
          </Svg>
        </View>
      ) : null}
      <View
        style={{
          height: 26,
          paddingHorizontal: 7,
          justifyContent: "center",
          backgroundColor: colour[props.ground],
        }}
      >
        <Text variant="unit" tone="ink3" hidden>
          {props.nameHidden ? "" : `${props.name}${NO_BREAK_SPACE}${NO_BREAK_SPACE}`}
          <Inline variant="asReadM" tone="ink">
            {formatNumber(value, places, language)}
          </Inline>
          {value === null ? "" : `${NO_BREAK_SPACE}${unit}`}
        </Text>
        <VisuallyHidden>{said}</VisuallyHidden>
      </View>
    </View>
  );
}

/** Two blocks standing on the pipe: the clamped pair of the flow meter. */
function clampPath(pipe: number): string {
  const top = 13 - pipe / 2 - 4.5;
  return `M4 ${top}h6v4.5h-6zM14 ${top}h6v4.5h-6z`;
}
