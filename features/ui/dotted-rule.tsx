import { View } from "react-native";
import Svg, { Line } from "react-native-svg";

import { useMeasuredWidth, useTheme } from "./theme";

/** The dotted line under a figure that opens its workings. */
export function DottedRule() {
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  return (
    <View aria-hidden onLayout={onLayout} style={{ height: 3, alignSelf: "stretch" }}>
      {width > 0 ? (
        <Svg width={width} height={3}>
          <Line
            x1={1}
            y1={1.5}
            x2={width}
            y2={1.5}
            stroke={colour.ruleStrong}
            strokeWidth={1.8}
            strokeLinecap="round"
            strokeDasharray="0.01 4.5"
          />
        </Svg>
      ) : null}
    </View>
  );
}
