import { View } from "react-native";
import Svg, { Circle, Path } from "react-native-svg";

import { drawingOf, type IconName } from "./icon-paths";
import { useTheme, type ColourRole } from "./theme";

export interface IconProps {
  name: IconName;
  size?: number;
  tone?: ColourRole;
  /** Leave out where words stand beside it; an icon alone needs its words here. */
  label?: string;
}

export function Icon({ name, size = 22, tone = "ink", label }: IconProps) {
  const { colour } = useTheme();
  const drawing = drawingOf(name);
  const pen = {
    fill: "none",
    stroke: colour[tone],
    strokeWidth: 1.9,
    strokeLinecap: "round",
    strokeLinejoin: "round",
  } as const;
  const wording = label ? { role: "img" as const, "aria-label": label } : { "aria-hidden": true };
  return (
    <View {...wording} style={{ width: size, height: size, flexShrink: 0 }}>
      <Svg width={size} height={size} viewBox="0 0 24 24">
        {drawing.paths.map((d) => (
          <Path key={d} d={d} {...pen} />
        ))}
        {drawing.dashed?.map(({ d, dash }) => (
          <Path key={d} d={d} {...pen} strokeDasharray={dash} />
        ))}
        {drawing.circles?.map(([cx, cy, r]) => (
          <Circle key={`${cx} ${cy} ${r}`} cx={cx} cy={cy} r={r} {...pen} />
        ))}
      </Svg>
    </View>
  );
}
