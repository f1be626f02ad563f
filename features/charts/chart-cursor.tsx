import Svg, { Circle, Line, Rect, Text as SvgText } from "react-native-svg";

import { typeScale, useTheme } from "@features/ui";

import type { ChartLayout } from "./chart-layout";

export interface CursorProps {
  layout: ChartLayout;
  /** Px from the frame's left. */
  x: number;
  /** Heights of the marks on the curves, px; null where there is no value. */
  marks: readonly (number | null)[];
  text: string;
}

/** Roughly what a letter of the narrow face takes, px; the pill must hold its words. */
const letterPx = 6.4;

/** A line through both panels with what is read there, in marking blue. */
export function ChartCursor({ layout, x, marks, text }: CursorProps) {
  const { colour } = useTheme();
  const width = Math.min(layout.width, text.length * letterPx + 32);
  const left = Math.min(layout.width - width, Math.max(0, x - width / 2));
  const height = 27;
  return (
    <Svg width={layout.width} height={layout.height}>
      <Line
        x1={x}
        x2={x}
        y1={layout.cursorTop}
        y2={layout.flow.bottom}
        stroke={colour.mark}
        strokeWidth={1.6}
      />
      {marks.map((y, index) =>
        y === null ? null : (
          <Circle
            key={index}
            cx={x}
            cy={y}
            r={4.5}
            fill={colour.sheet}
            stroke={colour.mark}
            strokeWidth={2.2}
          />
        ),
      )}
      <Rect x={left} y={0} width={width} height={height} rx={6} fill={colour.mark} />
      <SvgText
        x={left + width / 2}
        y={18.5}
        textAnchor="middle"
        fill={colour.onMark}
        fontFamily={typeScale.tableHead.fontFamily}
        fontSize={typeScale.tableHead.fontSize}
      >
        {text}
      </SvgText>
    </Svg>
  );
}
