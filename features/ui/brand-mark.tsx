import { View } from "react-native";
import Svg, { Path, Rect } from "react-native-svg";

import { useTheme, type ColourRole } from "./theme";

/** The mark: a loop, supply solid and return hollow, giving heat out. Words stand beside it. */
export function BrandMark({ size, ground = "pad" }: { size: number; ground?: ColourRole }) {
  const { colour } = useTheme();
  const pipe = { fill: "none", stroke: colour.ink, strokeWidth: 5.6 } as const;
  return (
    <View aria-hidden>
      <Svg width={size} height={size * 0.8} viewBox="0 0 35 28">
        <Path d="M3.5 13V11.5A8.5 8.5 0 0 1 12 3H20.5A8.5 8.5 0 0 1 29 11.5V13" {...pipe} />
        <Path d="M29 15V16.5A8.5 8.5 0 0 1 20.5 25H12A8.5 8.5 0 0 1 3.5 16.5V15" {...pipe} />
        <Path
          d="M29 14V16.5A8.5 8.5 0 0 1 20.5 25H12A8.5 8.5 0 0 1 3.5 16.5V14"
          fill="none"
          stroke={colour[ground]}
          strokeWidth={2.2}
        />
        <Rect x={25} y={7.6} width={10} height={12.8} fill={colour[ground]} />
        <Path d="M26 8.6L34.6 14 26 19.4z" fill={colour.copperMid} />
      </Svg>
    </View>
  );
}
